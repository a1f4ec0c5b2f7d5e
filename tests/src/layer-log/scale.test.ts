import fc from "fast-check";
import { expect, test } from "vitest";
import { decimalsOf, marksOf, multiples, niceStep, shareOf, valueAt } from "#src/lib/scale.ts";

test("steps are 1, 2 or 5 times a power of ten, and never give more parts than asked for", () =>
  fc.assert(
    fc.property(fc.double({ min: 1e-3, max: 1e6, noNaN: true }), fc.integer({ min: 1, max: 30 }), (span, most) => {
      const step = niceStep(span, most);
      const digit = step / 10 ** Math.floor(Math.log10(step) + 1e-9);
      expect([1, 2, 5].some((each) => Math.abs(each - digit) < 1e-6)).toBe(true);
      expect(span / step).toBeLessThanOrEqual(most * (1 + 1e-6));
    }),
  ));

test("multiples are exact decimals, ends included", () => {
  expect(multiples(0, 0.6, 0.2)).toEqual([0, 0.2, 0.4, 0.6]);
  expect(multiples(0.1, 0.55, 0.1)).toEqual([0.1, 0.2, 0.3, 0.4, 0.5]);
});

test("marks have as many decimals as their step, so that their points align", () => {
  expect(marksOf({ kind: "linear", from: 0, to: 1 }, 4).map(({ text }) => text)).toEqual(["0.0", "0.5", "1.0"]);
  expect(marksOf({ kind: "linear", from: 0, to: 60 }, 1).map(({ text }) => text)).toEqual(["0", "50"]);
  expect([0.05, 0.5, 1, 20].map(decimalsOf)).toEqual([2, 1, 0, 0]);
});

test("a logarithmic scale is marked at its decades", () => {
  expect(marksOf({ kind: "log", from: 0.1, to: 200 }, 9).map(({ text }) => text)).toEqual(["0.1", "1", "10", "100"]);
});

test("shares and values convert into each other on both kinds of scale", () =>
  fc.assert(
    fc.property(
      fc.constantFrom("linear" as const, "log" as const),
      fc.double({ min: 0, max: 1, noNaN: true }),
      (kind, share) => {
        const scale = { kind, from: 2, to: 700 };
        expect(shareOf(scale, valueAt(scale, share))).toBeCloseTo(share, 9);
      },
    ),
  ));

test("0 lies at the edge of a logarithmic scale, and what is less than 0 nowhere", () => {
  expect(shareOf({ kind: "log", from: 1, to: 10 }, 0)).toBe(0);
  expect(shareOf({ kind: "log", from: 1, to: 10 }, -1)).toBeNaN();
});
