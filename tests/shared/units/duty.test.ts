import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { dutySteps, dutyToS, roundDutyInward, sToDuty } from "#shared/units/duty.ts";

test("G14: per cent to S rounds to the nearest step, halves up", () => {
  const percents = [0, 10, 20, 25, 30, 40, 50, 60, 75, 80, 100];
  expect(percents.map((percent) => dutyToS(percent / 100))).toEqual([0, 26, 51, 64, 77, 102, 128, 153, 191, 204, 255]);
});

test("G14: from per cent to S and back is off by at most 0.196 %", () => {
  for (let percent = 0; percent <= 100; percent++) {
    expect(Math.abs(sToDuty(dutyToS(percent / 100)) - percent / 100)).toBeLessThanOrEqual(0.00197);
  }
});

test("G14: multiples of 20 % are exact", () => {
  for (const duty of [0, 0.2, 0.4, 0.6, 0.8, 1]) expect(sToDuty(dutyToS(duty))).toBe(duty);
});

test("G13: S above 255 is full power, and S1 on a 0-255 output is less than half a per cent", () => {
  expect(sToDuty(300)).toBe(1);
  expect(sToDuty(1)).toBeCloseTo(0.0039, 4);
});

test("outputs on a 0-255 scale have 255 steps, those written with decimals 1000", () => {
  expect(dutySteps({ by: "fan-index", fullScale: 255 })).toBe(255);
  expect(dutySteps({ by: "pin", fullScale: 255 })).toBe(255);
  expect(dutySteps({ by: "fan-index", fullScale: 1 })).toBe(1000);
  expect(dutySteps({ by: "named-fan" })).toBe(1000);
  expect(dutySteps({ by: "named-pin", fullScale: 255 })).toBe(1000);
});

describe("rounding inward", () => {
  test("takes the nearest step where the limits allow it", () => {
    expect(roundDutyInward(0.62, 255, 0, 1)).toBe(158 / 255);
    expect(roundDutyInward(0.6204, 1000, 0, 1)).toBe(0.62);
  });

  test("turns back from a step that would pass a limit", () => {
    // 0.85 * 255 = 216.75 and 0.12 * 255 = 30.6: the nearest steps 217 and 31 lie outside and inside.
    expect(roundDutyInward(0.85, 255, 0, 0.85)).toBe(216 / 255);
    expect(roundDutyInward(0.12, 255, 0.12, 1)).toBe(31 / 255);
    expect(roundDutyInward(0.101, 255, 0.101, 1)).toBe(26 / 255);
  });

  test("counts a limit that is a step, but for binary fractions, as on it", () => {
    expect(roundDutyInward(0.29, 1000, 0, 0.29)).toBe(0.29);
    expect(roundDutyInward(0.1 + 0.2, 1000, 0, 0.3)).toBe(0.3);
    expect(roundDutyInward(0.3, 1000, 0.1 + 0.2, 1)).toBe(0.3);
  });

  test("without a step between the limits goes below both, to the safe side", () => {
    expect(roundDutyInward(0.5019, 255, 0.5, 0.5015)).toBe(127 / 255);
    expect(roundDutyInward(0.001, 255, 0.001, 0.002)).toBe(0);
  });

  const duty = fc.double({ min: 0, max: 1, noNaN: true });
  const steps = fc.constantFrom(255, 1000);

  test("gives a whole step that never exceeds the upper limit", () => {
    fc.assert(
      fc.property(duty, duty, duty, steps, (a, b, wanted, n) => {
        const [lo, hi] = [Math.min(a, b), Math.max(a, b)];
        const rounded = roundDutyInward(wanted, n, lo, hi);
        expect(Math.abs(rounded * n - Math.round(rounded * n))).toBeLessThan(1e-9);
        expect(rounded).toBeGreaterThanOrEqual(0);
        expect(rounded).toBeLessThanOrEqual(hi + 1e-9);
      }),
    );
  });

  test("stays above the lower limit wherever a step lies between the limits", () => {
    fc.assert(
      fc.property(duty, duty, duty, steps, (a, b, wanted, n) => {
        const [lo, hi] = [Math.min(a, b), Math.max(a, b)];
        fc.pre(Math.ceil(lo * n) <= Math.floor(hi * n));
        expect(roundDutyInward(wanted, n, lo, hi)).toBeGreaterThanOrEqual(lo - 1e-9);
      }),
    );
  });

  test("moves a duty within the limits by less than a step, and a whole step not at all", () => {
    fc.assert(
      fc.property(fc.nat(1000), duty, steps, (count, hi, n) => {
        const step = Math.min(count, n) / n;
        expect(roundDutyInward(step, n, 0, 1)).toBe(step);
        expect(Math.abs(roundDutyInward(hi, n, 0, hi) - hi)).toBeLessThan(1 / n);
      }),
    );
  });
});
