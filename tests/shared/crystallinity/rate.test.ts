import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { relativeCrystallinity } from "#shared/crystallinity/avrami.ts";
import { RateTable, rateIntegral, ratePerS } from "#shared/crystallinity/rate.ts";
import type { Kinetics } from "#shared/polymers/material.ts";

/** Wide apart, so that the bell lies whole between them. */
const whole: Kinetics = {
  tgC: -99,
  tmC: 500,
  heatOfFusionJKg: 130e3,
  attainable: 0.35,
  avramiN: 2,
  fastestPerS: 0.5,
  fastestAtC: 200,
  halfWidthC: 40,
};
const peek = { ...whole, tgC: 143, tmC: 343, avramiN: 2.5, fastestPerS: 0.247, fastestAtC: 230, halfWidthC: 35 };

/** Cooled evenly through the whole window. */
const cooledAt = (ratePerSecond: number, kinetics: Kinetics) => {
  const { tgC, tmC, avramiN } = kinetics;
  const integral = rateIntegral(kinetics, [0, (tmC - tgC) / ratePerSecond], [tmC, tgC]);
  return relativeCrystallinity(integral, avramiN);
};

describe("a bell with Kmax 0.5 1/s, D 80 K and n 2 cooled evenly: closed form 1.0644670 Kmax D / q", () => {
  test.each([
    [20, 0.989245],
    [50, 0.515761],
    [100, 0.16581],
    // The rates at which just so much crystallises.
    [424.72, 0.01],
    [188.0, 0.05],
    [51.142, 0.5],
  ])("%d K/s leaves %d", (rate, left) => {
    expect(cooledAt(rate, whole)).toBeCloseTo(left, 4);
  });
});

test("K6: at constant temperature the Nakamura integral is Avrami's K t^n with K = Kn^n", () => {
  // On the entries of the rate's table, 0.25 K apart, and between them, each until about half has crystallised.
  for (const tempC of [150, 200, 290, 160.1, 199.87, 231.4, 267.63]) {
    const kn = ratePerS(peek, tempC);
    const seconds = 0.86 / kn;
    const times = [0, seconds / 3, seconds];
    const relative = relativeCrystallinity(rateIntegral(peek, times, [tempC, tempC, tempC]), peek.avramiN);
    const expected = 1 - Math.exp(-(kn ** peek.avramiN) * seconds ** peek.avramiN);
    expect(expected).toBeGreaterThan(0.4);
    expect(expected).toBeLessThan(0.6);
    expect(relative).toBeCloseTo(expected, 4);
  }
});

test("the half-width is half the width at half the height", () => {
  for (const side of [-35, 35]) expect(ratePerS(peek, 230 + side)).toBeCloseTo(0.247 / 2, 12);
});

test("nothing crystallises at or below Tg, nor at or above Tm", () => {
  const table = new RateTable(peek);
  for (const tempC of [-300, 100, 143, 343, 390, 1e6]) {
    expect(ratePerS(peek, tempC)).toBe(0);
    expect(table.at(tempC)).toBe(0);
    expect(table.mean(tempC, tempC)).toBe(0);
  }
  expect(table.mean(343, 500)).toBe(0);
  expect(table.mean(0, 143)).toBe(0);
});

const history = fc.array(
  fc.tuple(fc.double({ min: 0.01, max: 50, noNaN: true }), fc.double({ min: 20, max: 400, noNaN: true })),
  {
    minLength: 3,
    maxLength: 12,
  },
);

test("a history may be cut anywhere, and only ever adds", () => {
  fc.assert(
    fc.property(history, (pieces) => {
      let nowS = 0;
      const times = pieces.map(([dtS]) => (nowS += dtS));
      const temps = pieces.map(([, tempC]) => tempC);
      const cut = Math.floor(times.length / 2);
      const parts =
        rateIntegral(peek, times.slice(0, cut + 1), temps.slice(0, cut + 1)) +
        rateIntegral(peek, times.slice(cut), temps.slice(cut));
      const all = rateIntegral(peek, times, temps);
      expect(all).toBeCloseTo(parts, 9);
      expect(rateIntegral(peek, times.slice(0, cut + 1), temps.slice(0, cut + 1))).toBeLessThanOrEqual(all + 1e-12);
    }),
  );
});

test("faster cooling leaves less, and the peak comes at a lower temperature", () => {
  let before = 1;
  for (const rate of [0.5, 1, 2, 5, 10, 20, 50]) {
    const left = cooledAt(rate, peek);
    expect(left).toBeLessThanOrEqual(before);
    before = left;
  }
  const peakC = (rate: number) => {
    let integral = 0;
    let best = { growth: 0, tempC: 0 };
    for (let tempC = 343; tempC > 143; tempC -= 0.5) {
      const next = integral + rateIntegral(peek, [0, 0.5 / rate], [tempC, tempC - 0.5]);
      const growth = relativeCrystallinity(next, peek.avramiN) - relativeCrystallinity(integral, peek.avramiN);
      if (growth > best.growth) best = { growth, tempC };
      integral = next;
    }
    return best.tempC;
  };
  expect(peakC(1)).toBeLessThan(peakC(0.2));
  expect(peakC(5)).toBeLessThan(peakC(1));
});
