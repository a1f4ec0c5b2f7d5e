import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { GrowthTable, halfTimeS, integralOf, relativeCrystallinity } from "#shared/crystallinity/avrami.ts";

/** K t^n with the K of the examples, as an integral of the rate constant Kn = K^(1/n). */
const reached = (timeS: number, k: number, n: number) => relativeCrystallinity(k ** (1 / n) * timeS, n);

describe("closed forms: half-time, and twice the half-time (Avrami, IUPAC Gold Book A00545)", () => {
  test.each([
    { n: 2, k: 1e-3, half: 26.3277, twice: 0.9375 },
    { n: 3, k: 1e-4, half: 19.0667, twice: 0.99609375 },
    { n: 2.5, k: 0.02, half: 4.1297, twice: 0.980179 },
  ])("n $n, K $k", ({ n, k, half, twice }) => {
    expect(halfTimeS(k ** (1 / n), n)).toBeCloseTo(half, 4);
    expect(reached(half, k, n)).toBeCloseTo(0.5, 5);
    expect(reached(2 * halfTimeS(k ** (1 / n), n), k, n)).toBeCloseTo(twice, 6);
  });

  test("after m half-times 1 - 2^-(m^n) is reached", () => {
    for (const m of [0.3, 1, 1.7])
      expect(relativeCrystallinity(m * Math.LN2 ** (1 / 2.4), 2.4)).toBeCloseTo(1 - 2 ** -(m ** 2.4), 12);
  });
});

test("integral and relative crystallinity belong to each other", () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 3, noNaN: true }),
      fc.double({ min: 0.5, max: 4, noNaN: true }),
      (integral, n) => {
        fc.pre(integral ** n < 20);
        expect(integralOf(relativeCrystallinity(integral, n), n)).toBeCloseTo(integral, 5);
      },
    ),
  );
  expect(integralOf(1, 2.5)).toBeLessThan(10);
});

test("the table is right to 2e-5 for exponents from 1 to 6, and never above 1", () => {
  for (const n of [1, 1.5, 2.5, 4, 6]) {
    const table = new GrowthTable(n);
    for (let i = 0; i < 2_000; i++) {
      const integral = i / 300;
      expect(Math.abs(table.at(integral) - relativeCrystallinity(integral, n))).toBeLessThan(2e-5);
    }
    expect(table.at(1e9)).toBe(1);
  }
});
