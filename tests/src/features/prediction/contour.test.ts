import fc from "fast-check";
import { expect, test } from "vitest";
import { areaWithin, type Grid, isoLine, type Point, valueWithin } from "#src/features/prediction/contour.ts";

const ascending = fc
  .array(fc.double({ min: 0.01, max: 1, noNaN: true }), { minLength: 2, maxLength: 5 })
  .map((steps) => {
    let at = 0;
    return steps.map((step) => {
      at += step;
      return at;
    });
  });

/** Any values over any crossings. */
const anyGrid: fc.Arbitrary<Grid> = fc
  .tuple(ascending, ascending)
  .chain(([x, y]) =>
    fc
      .array(fc.integer({ min: 20, max: 300 }), { minLength: x.length * y.length, maxLength: x.length * y.length })
      .map((values) => ({ x, y, values })),
  );

const area = (corners: readonly Point[]): number =>
  Math.abs(
    corners.reduce((sum, [x, y], i) => {
      const [nextX, nextY] = corners[(i + 1) % corners.length];
      return sum + x * nextY - nextX * y;
    }, 0) / 2,
  );
const sum = (polygons: readonly Point[][]): number => polygons.reduce((total, corners) => total + area(corners), 0);

/** T = 100 + 40 x - 20 y, a plane. */
const plane: Grid = {
  x: [0, 0.1, 0.5, 1],
  y: [0, 0.3, 1],
  values: [0, 0.3, 1].flatMap((y) => [0, 0.1, 0.5, 1].map((x) => 100 + 40 * x - 20 * y)),
};

test("areas below, between and above two levels fill the picture exactly", () => {
  fc.assert(
    fc.property(anyGrid, fc.integer({ min: 0, max: 320 }), fc.integer({ min: 0, max: 320 }), (grid, a, b) => {
      const [low, high] = [Math.min(a, b), Math.max(a, b) + 0.5];
      const whole = (grid.x.at(-1)! - grid.x[0]) * (grid.y.at(-1)! - grid.y[0]);
      const parts =
        sum(areaWithin(grid, Number.NEGATIVE_INFINITY, low)) +
        sum(areaWithin(grid, low, high)) +
        sum(areaWithin(grid, high, Number.POSITIVE_INFINITY));
      // A triangle that lies level exactly at a border belongs to both sides.
      const level = [...triangleAreas(grid, low), ...triangleAreas(grid, high)].reduce((total, one) => total + one, 0);
      expect(parts - level).toBeCloseTo(whole, 9);
    }),
  );
});

function triangleAreas({ x, y, values }: Grid, level: number): number[] {
  const flat: number[] = [];
  for (let j = 0; j + 1 < y.length; j++) {
    for (let i = 0; i + 1 < x.length; i++) {
      const at = (di: number, dj: number) => values[(j + dj) * x.length + i + di];
      const half = ((x[i + 1] - x[i]) * (y[j + 1] - y[j])) / 2;
      if ([at(0, 0), at(1, 0), at(1, 1)].every((value) => value === level)) flat.push(half);
      if ([at(0, 0), at(1, 1), at(0, 1)].every((value) => value === level)) flat.push(half);
    }
  }
  return flat;
}

test("over a plane the line of equal temperature is the straight line it must be", () => {
  const pieces = isoLine(plane, 110);
  expect(pieces.length).toBeGreaterThan(2);
  for (const [x, y] of pieces.flat()) expect(100 + 40 * x - 20 * y).toBeCloseTo(110, 9);
  const length = pieces.reduce((total, [a, b]) => total + Math.hypot(a[0] - b[0], a[1] - b[1]), 0);
  // From (0.25, 0) to (0.75, 1).
  expect(length).toBeCloseTo(Math.hypot(0.5, 1), 9);
});

test("a level outside the values has no line and no area beyond it", () => {
  expect(isoLine(plane, 500)).toEqual([]);
  expect(areaWithin(plane, 500, Number.POSITIVE_INFINITY)).toEqual([]);
});

test("the value at a place is that of the plane, and of the crossing at a crossing", () => {
  expect(valueWithin(plane, [0.3, 0.65])).toBeCloseTo(100 + 40 * 0.3 - 20 * 0.65, 9);
  fc.assert(
    fc.property(anyGrid, fc.nat(), fc.nat(), (grid, i, j) => {
      const [at, row] = [i % grid.x.length, j % grid.y.length];
      expect(valueWithin(grid, [grid.x[at], grid.y[row]])).toBeCloseTo(grid.values[row * grid.x.length + at], 9);
    }),
  );
});
