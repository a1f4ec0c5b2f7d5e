import fc from "fast-check";
import { expect, test } from "vitest";
import type { CurvePoint } from "#shared/formats/profile.ts";
import {
  CURVE_GRIDS,
  curveDuty,
  movedPoint,
  overRange,
  pointAdded,
  pointAfter,
  pointRemoved,
} from "#src/features/profiles/editor/curve-edits.ts";
import { quantityScale, steppedPoint } from "#src/features/profiles/editor/curve-view.ts";
import { asRule } from "#src/features/profiles/editor/rule-editor.tsx";

const grid = CURVE_GRIDS["layer-time"];
const points: CurvePoint[] = [
  [3, 0.55],
  [10, 0.3],
  [40, 0.12],
];

test("a dragged point is rounded to its grid", () => {
  expect(movedPoint(points, 1, [12.3456, 0.4321], grid)[1]).toEqual([12.3, 0.43]);
});

test("a dragged point stays between its neighbours, above 0 and within duties", () => {
  expect(movedPoint(points, 1, [99, 2], grid)[1]).toEqual([39.9, 1]);
  expect(movedPoint(points, 1, [-5, -2], grid)[1]).toEqual([3.1, 0]);
  expect(movedPoint(points, 0, [-5, 0.5], grid)[0]).toEqual([0, 0.5]);
  expect(movedPoint(points, 2, [1e4, 0.5], grid)[2]).toEqual([10_000, 0.5]);
});

test("points stay sorted and apart whatever is done to them", () =>
  fc.assert(
    fc.property(
      fc.array(
        fc.tuple(
          fc.nat(9),
          fc.double({ min: -10, max: 100, noNaN: true }),
          fc.constantFrom("move", "add", "after", "remove"),
        ),
      ),
      (steps) => {
        let curve = points;
        for (const [n, x, act] of steps) {
          const i = n % curve.length;
          if (act === "move") curve = movedPoint(curve, i, [x, x / 50], grid);
          if (act === "add") curve = pointAdded(curve, [x, 0.5], grid);
          if (act === "after") curve = pointAfter(curve, i, grid);
          if (act === "remove") curve = pointRemoved(curve, i);
        }
        expect(curve.length).toBeGreaterThan(0);
        for (let i = 1; i < curve.length; i++) expect(curve[i][0]).toBeGreaterThan(curve[i - 1][0]);
        for (const [, duty] of curve) expect(duty >= 0 && duty <= 1).toBe(true);
      },
    ),
  ));

test("a new point lies on the line between its neighbours, or goes on beyond the last", () => {
  expect(pointAfter(points, 0, grid)[1]).toEqual([6.5, 0.43]);
  expect(pointAfter(points, 2, grid)[3]).toEqual([70, 0.12]);
});

test("where a point stands already no second one is put", () => {
  expect(pointAdded(points, [10.02, 0.9], grid)).toEqual(points);
});

test("the last point can't be removed", () => {
  expect(pointRemoved([[3, 0.5]], 0)).toEqual([[3, 0.5]]);
});

test("over another quantity the same duties spread over its range", () => {
  expect(overRange(points, [100, 3000], CURVE_GRIDS["deposited-length"])).toEqual([
    [100, 0.55],
    [649, 0.3],
    [3000, 0.12],
  ]);
});

test("a curve is flat beyond its ends and straight between its points", () => {
  expect([0, 3, 6.5, 40, 99].map((x) => curveDuty(points, x))).toEqual([0.55, 0.55, expect.closeTo(0.425), 0.12, 0.12]);
});

test("arrow keys move a point along both axes, other keys do not", () => {
  expect(steppedPoint([10, 0.3], "ArrowRight", 1, 0.5, 0.01)).toEqual([10.5, 0.3]);
  expect(steppedPoint([10, 0.3], "ArrowDown", 10, 0.5, 0.01)?.[1]).toBeCloseTo(0.2);
  expect(steppedPoint([10, 0.3], "Enter", 1, 0.5, 0.01)).toBeUndefined();
});

test("one very long layer does not squeeze the curve into a corner", () => {
  expect(quantityScale(points, [5, 9, 900]).to).toBe(80);
  expect(quantityScale(points).to).toBeCloseTo(46);
});

test("a fixed duty becomes a flat curve, a curve its duty in the middle", () => {
  const fixed = { channel: "lamp", rule: "fixed" as const, duty: 0.62 };
  expect(asRule(fixed, "curve")).toMatchObject({
    rule: "curve",
    over: "layer-time",
    points: [
      [5, 0.62],
      [20, 0.62],
      [60, 0.62],
    ],
  });
  expect(asRule({ channel: "part-fan", rule: "curve", over: "height", points }, "fixed")).toMatchObject({
    rule: "fixed",
    duty: 0.23,
  });
  expect(asRule(fixed, "fixed")).toBe(fixed);
});
