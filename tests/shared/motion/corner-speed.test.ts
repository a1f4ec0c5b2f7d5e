import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { deviationForSquareCorner, junctionSpeedSq, midMoveSpeedSq } from "#shared/motion/corner-speed.ts";

/** u1·u2 from the angle between the moves: 180° is straight on. */
const dotOf = (includedDegrees: number): number => -Math.cos((includedDegrees * Math.PI) / 180);

describe("T5: a square-corner speed of 5 mm/s at 3,000 mm/s²", () => {
  const deviationMm = deviationForSquareCorner(5, 3000);

  test("is a deviation of 0.00345178 mm", () => {
    expect(deviationMm).toBeCloseTo(0.00345178, 8);
  });

  test.each([
    [30, 1.9016],
    [60, 3.218],
    [90, 5],
    [120, 8.1816],
    [135, 11.2109],
    [150, 17.1333],
    [170, 52.0667],
  ])("gives %i° a speed of %d mm/s", (angle, speedMmS) => {
    expect(Math.sqrt(junctionSpeedSq(3000, deviationMm, dotOf(angle)))).toBeCloseTo(speedMmS, 4);
  });
});

test("T6: deviations of 0.01 mm at 90° and of 0.05 mm at 60°", () => {
  expect(Math.sqrt(junctionSpeedSq(1000, 0.01, dotOf(90)))).toBeCloseTo(4.91346, 5);
  expect(Math.sqrt(junctionSpeedSq(500, 0.05, dotOf(60)))).toBeCloseTo(5, 10);
});

test("a square corner is taken at its own speed, whatever the acceleration", () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0.1, max: 50, noNaN: true }),
      fc.double({ min: 10, max: 50_000, noNaN: true }),
      (v, a) => {
        expect(Math.sqrt(junctionSpeedSq(a, deviationForSquareCorner(v, a), 0)) / v).toBeCloseTo(1, 9);
      },
    ),
  );
});

test("straight on there is no limit, at a reversal there is a full stop", () => {
  expect(junctionSpeedSq(1500, 0.01, 1)).toBe(Number.POSITIVE_INFINITY);
  expect(junctionSpeedSq(1500, 0.01, 1 + 1e-15)).toBe(Number.POSITIVE_INFINITY);
  expect(junctionSpeedSq(1500, 0.01, -1)).toBe(0);
  expect(junctionSpeedSq(1500, 0.01, -1 - 1e-15)).toBe(0);
  expect(midMoveSpeedSq(1500, 2, 1)).toBe(Number.POSITIVE_INFINITY);
  expect(midMoveSpeedSq(1500, 2, -1)).toBe(0);
});

test("on chords of a circle the mid-move bound is the speed at which the centripetal acceleration is the machine's", () => {
  const [radiusMm, turn] = [10, 0.002];
  const chordMm = 2 * radiusMm * Math.sin(turn / 2);
  expect(midMoveSpeedSq(1500, chordMm, Math.cos(turn)) / (1500 * radiusMm)).toBeCloseTo(1, 5);
});

test("the wider a corner opens, the faster it may be taken", () => {
  const degrees = fc.integer({ min: 1, max: 179 });
  fc.assert(
    fc.property(degrees, degrees, (a, b) => {
      const [tight, open] = [Math.min(a, b), Math.max(a, b)].map(dotOf);
      expect(junctionSpeedSq(1500, 0.01, tight)).toBeLessThanOrEqual(junctionSpeedSq(1500, 0.01, open));
      expect(midMoveSpeedSq(1500, 2, tight)).toBeLessThanOrEqual(midMoveSpeedSq(1500, 2, open));
    }),
  );
});
