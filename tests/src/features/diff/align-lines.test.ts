import { expect, test } from "vitest";
import { alignLines } from "#src/features/diff/align-lines.ts";

test("lines taken out and put in have no counterpart, all others have theirs", () => {
  expect(alignLines(["a", "M107", "b"], ["a", "M106 S9 ;ql", "b"])).toEqual([
    [0, 0],
    [-1, 1],
    [1, -1],
    [2, 2],
  ]);
});

test("new numbers and checksums make no line another one", () => {
  expect(alignLines(["N7 G1 X1*40", "N8 G1 X2*43"], ["N7 M106 S9*2 ;ql", "N8 G1 X1*39", "N9 G1 X2*42"])).toEqual([
    [-1, 0],
    [0, 1],
    [1, 2],
  ]);
});

test("an end that only one file has is found", () => {
  expect(alignLines(["a", "b"], ["a"])).toEqual([
    [0, 0],
    [1, -1],
  ]);
  expect(alignLines([], ["a"])).toEqual([[-1, 0]]);
});
