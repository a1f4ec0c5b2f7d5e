import { describe, expect, test } from "vitest";
import { motionRules } from "#shared/motion/motion-rules.ts";
import { deviationCornerSq, jerkCornerSq, limitByAxes, startFromRestSq } from "#shared/motion/move-limits.ts";
import { DEVIATION, JERK, tern, ternCornering } from "#tests/helpers/tern.ts";

const xy = { x: { maxSpeedMmS: 60, maxAccelMmS2: 600 }, y: { maxSpeedMmS: 30, maxAccelMmS2: 900 } };

describe("axis limits", () => {
  const limit = (motion: object, dx: number, dy: number, dz: number, de: number): number[] => {
    const out = new Float64Array(2);
    limitByAxes(motionRules(tern({ motion }).motion), dx, dy, dz, de, Math.hypot(dx, dy, dz), 200, 1500, out);
    return [...out];
  };

  test("hold for each axis by its share of the move", () => {
    expect(limit({ axes: xy }, 10, 0, 0, 0)).toEqual([60, 600]);
    expect(limit({ axes: xy }, 0, -10, 0, 0)).toEqual([30, 900]);
    const [speed, accel] = limit({ axes: xy }, 6, 8, 0, 0);
    expect(speed).toBeCloseTo(30 / 0.8, 12);
    expect(accel).toBeCloseTo(600 / 0.6, 12);
  });

  test("of the extruder hold for a laying move only where it pulls back, or where they hold for every move", () => {
    expect(limit({}, 10, 0, 0, 20)).toEqual([200, 1500]);
    expect(limit({}, 10, 0, 0, -20)).toEqual([30, 750]);
    expect(limit({ extruderLimits: "every-move" }, 10, 0, 0, 20)).toEqual([30, 750]);
    expect(limit({}, 0, 0, 10, 20)).toEqual([10, 100]);
  });
});

describe("junction deviation", () => {
  const corner = (axes: object, turn: number, lengthMm = 10): number => {
    const rules = motionRules(ternCornering(DEVIATION, { axes }).motion);
    const [x, y] = [Math.cos(turn), Math.sin(turn)];
    return deviationCornerSq(rules, [x - 1, y, 0], x, 1500, lengthMm);
  };

  test("uses the acceleration that the axes allow along the change of direction", () => {
    expect(corner({}, Math.PI / 2)).toBeCloseTo((1500 * 0.013 * Math.SQRT1_2) / (1 - Math.SQRT1_2), 9);
    const limited = corner({ x: { maxAccelMmS2: 300 } }, Math.PI / 2);
    expect(limited / corner({}, Math.PI / 2)).toBeCloseTo((300 * Math.SQRT2) / 1500, 9);
  });

  test("takes short chords at an obtuse angle as an arc: v² = a·r", () => {
    expect(corner({}, 0.1, 0.5)).toBeCloseTo((1500 * 0.5) / 0.1, 6);
    expect(corner({}, 0.01, 0.5)).toBeCloseTo((1500 * 0.5) / 0.033, 6);
    expect(corner({}, 0.1, 1)).toBeGreaterThan(corner({}, 0.1, 0.999));
    expect(corner({}, 1, 0.5)).toBe(corner({}, 1, 5));
  });

  test("is free straight on and a stop at a reversal", () => {
    expect(corner({}, 0)).toBe(Number.POSITIVE_INFINITY);
    expect(corner({}, 0.001)).toBe(Number.POSITIVE_INFINITY);
    expect(corner({}, Math.PI)).toBe(0);
  });
});

describe("axis jerk", () => {
  const rules = motionRules(ternCornering(JERK).motion);

  test("slows a corner until no axis jumps by more than its own", () => {
    expect(jerkCornerSq(rules, [-1, 1, 0, 0], 50 ** 2)).toBeCloseTo(8 ** 2, 9);
    expect(jerkCornerSq(rules, [-2, 0, 0, 0], 50 ** 2)).toBeCloseTo(4 ** 2, 9);
    expect(jerkCornerSq(rules, [0, 0, 1, 0], 50 ** 2)).toBeCloseTo(0.4 ** 2, 9);
    expect(jerkCornerSq(rules, [0.1, 0, 0, 0.2], 50 ** 2)).toBeCloseTo(25 ** 2, 9);
  });

  test("leaves a gentle corner at the common speed", () => {
    expect(jerkCornerSq(rules, [0.1, 0.1, 0, 0], 50 ** 2)).toBe(2500);
    expect(jerkCornerSq(rules, [0, 0, 0, 0], 50 ** 2)).toBe(2500);
  });

  test("lets a move start from rest at the speed whose parts equal it, never above its own", () => {
    expect(startFromRestSq(rules, [1, 0, 0, 0], 50 ** 2)).toBeCloseTo(64, 9);
    expect(startFromRestSq(rules, [0.6, 0.8, 0, 0], 50 ** 2)).toBeCloseTo(100, 9);
    expect(startFromRestSq(rules, [0.6, 0.8, 0, 0], 3 ** 2)).toBeCloseTo(9, 9);
    expect(startFromRestSq(rules, [0, 0, 0, -1], 50 ** 2)).toBeCloseTo(25, 9);
  });
});
