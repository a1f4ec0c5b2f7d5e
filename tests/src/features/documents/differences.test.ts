import { expect, test } from "vitest";
import { differences } from "#src/features/documents/differences.ts";

const zone = (name: string, to: number, more: object = {}) => ({ name, from: 0, to, ...more });
const inZone = (entry: string, field: string) => [{ field: "zones" }, { entry }, { field }];

test("equal documents do not differ, whatever the order of their fields", () => {
  expect(differences({ a: 1, b: [2, 3] }, { b: [2, 3], a: 1 })).toEqual([]);
});

test("a changed value is named with its place", () => {
  const found = differences({ zones: [zone("base", 6)] }, { zones: [zone("base", 7)] });
  expect(found).toEqual([{ place: inZone("base", "to"), before: 6, after: 7 }]);
});

test("a number and a text that look alike differ", () => {
  expect(differences({ a: 1 }, { a: "1" })).toEqual([{ place: [{ field: "a" }], before: 1, after: "1" }]);
});

test("a zone put in below leaves the others as they were", () => {
  const found = differences({ zones: [zone("lip", 9)] }, { zones: [zone("base", 6), zone("lip", 9)] });
  expect(found.map(({ place }) => place)).toEqual(["name", "from", "to"].map((field) => inZone("base", field)));
  expect(found.every(({ before }) => before === undefined)).toBe(true);
});

test("two zones of one name are told apart", () => {
  const before = { zones: [zone("rib", 1), zone("rib", 2)] };
  const after = { zones: [zone("rib", 1), zone("rib", 3)] };
  expect(differences(before, after)).toEqual([{ place: inZone("rib 2", "to"), before: 2, after: 3 }]);
});

test("a curve is one place", () => {
  const [was, is] = [
    [[3, 0.5]],
    [
      [3, 0.5],
      [10, 0.3],
    ],
  ];
  expect(differences({ points: was }, { points: is })).toEqual([
    { place: [{ field: "points" }], before: was, after: is },
  ]);
});

test("what went has no after", () => {
  expect(differences({ note: "x" }, {})).toEqual([{ place: [{ field: "note" }], before: "x", after: undefined }]);
});
