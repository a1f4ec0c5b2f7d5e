import { describe, expect, test } from "vitest";
import { parsePolymer } from "#shared/formats/polymer.ts";
import { fitHalfTimes } from "#shared/polymers/fit-half-times.ts";
import { materialOf } from "#shared/polymers/material.ts";
import { card, problemsOf, refusal } from "#tests/shared/formats/documents.ts";

const between = { tgC: 143, tmC: 343 };
const halfTime = (tempC: number, fastestPerS: number, n: number) =>
  Math.LN2 ** (1 / n) / (fastestPerS * Math.exp(-Math.LN2 * ((tempC - 236) / 41) ** 2));

describe("a bell fitted to half-times", () => {
  test("is the bell they were made from", () => {
    const points = [180, 200, 230, 250, 280].map((tempC): [number, number] => [tempC, halfTime(tempC, 0.31, 2.5)]);
    const bell = fitHalfTimes(points, 2.5, between);
    expect(bell.fastestPerS).toBeCloseTo(0.31, 10);
    expect(bell.fastestAtC).toBeCloseTo(236, 8);
    expect(bell.halfWidthC).toBeCloseTo(41, 8);
  });

  test("stands in for the one on the card", () => {
    const points = [180, 230, 280].map((tempC) => [tempC, halfTime(tempC, 0.31, 2.5)]);
    const plain = card();
    const halfTimes = { points, source: "own calorimeter", confidence: "own measurement" };
    const { kinetics } = materialOf(parsePolymer({ ...plain, crystallinity: { ...plain.crystallinity, halfTimes } }));
    expect(kinetics?.fastestAtC).toBeCloseTo(236, 8);
    expect(materialOf(parsePolymer(plain)).kinetics?.fastestAtC).toBe(240);
  });

  test("is refused where the half-times show no fastest temperature", () => {
    const rising: [number, number][] = [
      [180, 9],
      [200, 5],
      [220, 3],
    ];
    expect(
      refusal(() =>
        fitHalfTimes(
          rising.map(([c, s]) => [c, 30 / s]),
          2.5,
          between,
        ),
      ).code,
    ).toBe("half-times-unusable");
  });

  test("is refused for points where nothing crystallises, and for fewer than three", () => {
    const withPoints = (points: number[][]) => {
      const plain = card();
      plain.crystallinity.halfTimes = { points, source: "own calorimeter", confidence: "own measurement" };
      return () => parsePolymer(plain);
    };
    expect(
      problemsOf(
        withPoints([
          [140, 9],
          [200, 5],
          [220, 6],
        ]),
      )[0],
    ).toMatch(/points\[0\].*not between Tg 143 and Tm 343/);
    expect(
      problemsOf(
        withPoints([
          [200, 5],
          [220, 6],
        ]),
      )[0],
    ).toContain("fewer than 3 points");
  });
});

describe("an amorphous polymer", () => {
  test("needs neither Tm nor kinetics", () => {
    const { tmC: _, solidAtRelativeCrystallinity: __, ...rest } = card();
    const material = materialOf(parsePolymer({ ...rest, crystallinity: null }));
    expect(material.tmC).toBeNull();
    expect(material.kinetics).toBeNull();
    expect(material.solidAtRelativeCrystallinity).toBeNull();
  });

  test("one that crystallises needs its Tm", () => {
    const { tmC: _, ...rest } = card();
    expect(problemsOf(() => parsePolymer(rest))).toContain(
      "tmC: is missing. Add it, or give crystallinity null for an amorphous polymer.",
    );
  });
});

test("a Tg that is too close to Tm in kelvin is another quantity: 240 °C for PEEK, as one property site has it", () => {
  const wrong = card();
  wrong.tgC.value = 240;
  wrong.crystallinity.fastestAtC.value = 300;
  expect(problemsOf(() => parsePolymer(wrong))[0]).toMatch(/^tgC\.value: is 240: Tg over Tm in kelvin is 0\.83/);
});
