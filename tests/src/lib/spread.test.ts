import { expect, test } from "vitest";
import { apart, atLeast } from "#src/lib/spread.ts";

test("what is too low is made high enough, and what has room to spare gives it in proportion", () => {
  const heights = atLeast([4, 124, 224], 24);
  expect(heights[0]).toBe(24);
  expect(heights.reduce((sum, height) => sum + height, 0)).toBeCloseTo(352, 9);
  expect(heights.slice(1)).toEqual([124 - 20 / 3, 224 - 40 / 3]);
});

test("where there is no room for all, all are alike", () => {
  expect(atLeast([1, 2, 57], 24)).toEqual([20, 20, 20]);
});

test("places that are far apart stay, those too close move just so far, and none leaves its range", () => {
  expect(apart([10, 100], 24, [0, 200])).toEqual([10, 100]);
  expect(apart([10, 12, 100], 24, [0, 200])).toEqual([10, 34, 100]);
  expect(apart([180, 190, 199], 24, [0, 200])).toEqual([152, 176, 200]);
});
