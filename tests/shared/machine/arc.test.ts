import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type Arc, arcFromCentre, arcFromRadius, arcLengthMm } from "#shared/machine/arc.ts";

const degrees = (radians: number): number => (radians * 180) / Math.PI;

describe("check values of the reference sheet", () => {
  type Case = [
    name: string,
    arc: Arc | undefined,
    centre: [number, number],
    radius: number,
    sweep: number,
    length: number,
  ];
  test.each<Case>([
    ["G5", arcFromCentre(7, 7, 10, 16, 3, 4, true), [10, 11], 5, -143.1301, 12.490458],
    ["G6 by centre", arcFromCentre(9, 6, 2, 7, -4, -3, false), [5, 3], 5, 90, 7.853982],
    ["G6 by radius", arcFromRadius(9, 6, 2, 7, 5, false), [5, 3], 5, 90, 7.853982],
    ["G7", arcFromCentre(0, 0, 1, 1, 1, 0, true), [1, 0], 1, -90, 1.570796],
    ["G8 out", arcFromCentre(0, 0, 0, 1, 1, 0.5, true), [1, 0.5], 1.118034, -53.1301, 1.036748],
    ["G8 back", arcFromCentre(0, 1, 0, 0, 1, -0.5, false), [1, 0.5], 1.118034, 53.1301, 1.036748],
    ["G9", arcFromCentre(0, 0, 0, 0, 20, 20, true), [20, 20], 28.284271, -360, 177.715318],
    ["G10", arcFromRadius(0, 0, 10, 15, 20, true), [19.855069, -2.403379], 20, -53.5764, 18.701701],
    ["G10 the long way", arcFromRadius(0, 0, 10, 15, -20, true), [-9.855069, 17.403379], 20, -306.4236, 106.962005],
  ])("%s", (_, arc, [x, y], radius, sweep, length) => {
    expect(arc!.centreX).toBeCloseTo(x, 6);
    expect(arc!.centreY).toBeCloseTo(y, 6);
    expect(arc!.radiusMm).toBeCloseTo(radius, 6);
    expect(degrees(arc!.sweepRad)).toBeCloseTo(sweep, 4);
    expect(arcLengthMm(arc!)).toBeCloseTo(length, 6);
  });

  test("G5 with a rise of 4 mm", () => {
    expect(arcLengthMm(arcFromCentre(7, 7, 10, 16, 3, 4, true)!, 4)).toBeCloseTo(13.115317, 6);
  });

  test("G11: start and end on different circles are no arc", () => {
    expect(arcFromCentre(0, 0, 10, 16, 3, 4, true)).toBeUndefined();
  });
});

describe("the end may miss the circle", () => {
  test("by 0.005 mm, or by a thousandth of the radius, never by more than 0.5 mm", () => {
    const quarter = (radius: number, miss: number) =>
      arcFromCentre(radius, 0, 0, radius + miss, -radius, 0, false) !== undefined;
    expect(quarter(1, 0.004)).toBe(true);
    expect(quarter(1, 0.006)).toBe(false);
    expect(quarter(100, 0.09)).toBe(true);
    expect(quarter(100, 0.11)).toBe(false);
    expect(quarter(1000, 0.49)).toBe(true);
    expect(quarter(1000, 0.51)).toBe(false);
  });

  test("no radius at all is no arc", () => {
    expect(arcFromCentre(1, 1, 1, 1, 0, 0, true)).toBeUndefined();
    expect(arcFromCentre(1, 1, 2, 1, Number.NaN, 0, true)).toBeUndefined();
  });
});

describe("by radius", () => {
  test("a half circle is reached exactly, a wider gap is refused", () => {
    expect(degrees(arcFromRadius(0, 0, 10, 0, 5, false)!.sweepRad)).toBeCloseTo(180, 6);
    expect(arcFromRadius(0, 0, 10, 0, 4.9, false)).toBeUndefined();
    expect(arcFromRadius(0, 0, 10, 0, 0, false)).toBeUndefined();
  });

  test("start and end in one point leave the circle open, so it is refused", () => {
    expect(arcFromRadius(3, 3, 3, 3, 5, true)).toBeUndefined();
  });

  test("agrees with the form by centre: on the circle, and up to 180° for a positive radius only", () => {
    const coordinate = fc.double({ min: -100, max: 100, noNaN: true });
    fc.assert(
      fc.property(
        coordinate,
        coordinate,
        fc.double({ min: 0.51, max: 20, noNaN: true }),
        fc.boolean(),
        fc.boolean(),
        (x, y, times, long, clockwise) => {
          const chord = Math.hypot(x, y);
          fc.pre(chord > 1);
          const radius = chord * times * (long ? -1 : 1);
          const arc = arcFromRadius(0, 0, x, y, radius, clockwise)!;
          expect(Math.hypot(arc.centreX, arc.centreY)).toBeCloseTo(Math.abs(radius), 6);
          expect(Math.hypot(arc.centreX - x, arc.centreY - y)).toBeCloseTo(Math.abs(radius), 6);
          expect(Math.abs(arc.sweepRad) > Math.PI).toBe(long);
          expect(arc.sweepRad < 0).toBe(clockwise);
        },
      ),
    );
  });
});

test("a turn goes the way that was asked for, once around at most", () => {
  const angle = fc.double({ min: 0, max: 2 * Math.PI, noNaN: true });
  fc.assert(
    fc.property(angle, angle, fc.double({ min: 0.1, max: 200, noNaN: true }), fc.boolean(), (a, b, r, clockwise) => {
      const [sx, sy, ex, ey] = [r * Math.cos(a), r * Math.sin(a), r * Math.cos(b), r * Math.sin(b)];
      const { sweepRad } = arcFromCentre(sx, sy, ex, ey, -sx, -sy, clockwise)!;
      expect(Math.abs(sweepRad)).toBeLessThanOrEqual(2 * Math.PI);
      if (sweepRad !== 0) expect(sweepRad < 0).toBe(clockwise);
      const turned = [
        sx * Math.cos(sweepRad) - sy * Math.sin(sweepRad),
        sx * Math.sin(sweepRad) + sy * Math.cos(sweepRad),
      ];
      expect(turned[0]).toBeCloseTo(ex, 6);
      expect(turned[1]).toBeCloseTo(ey, 6);
    }),
  );
});
