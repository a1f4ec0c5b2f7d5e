import { expect, test } from "vitest";
import { differences } from "#src/features/documents/differences.ts";

const zone = (name: string, to: number, more: object = {}) => ({ name, from: 0, to, ...more });

test("equal documents do not differ, whatever the order of their fields", () => {
  expect(differences({ a: 1, b: [2, 3] }, { b: [2, 3], a: 1 })).toEqual([]);
});

test("a changed value is named with its place", () => {
  const found = differences({ zones: [zone("base", 6)] }, { zones: [zone("base", 7)] });
  expect(found).toEqual([{ path: "zones[base].to", before: "6", after: "7" }]);
});

test("a zone put in below leaves the others as they were", () => {
  const found = differences({ zones: [zone("lip", 9)] }, { zones: [zone("base", 6), zone("lip", 9)] });
  expect(found.map(({ path }) => path)).toEqual(["zones[base].name", "zones[base].from", "zones[base].to"]);
  expect(found.every(({ before }) => before === undefined)).toBe(true);
});

test("two zones of one name are told apart", () => {
  const before = { zones: [zone("rib", 1), zone("rib", 2)] };
  const after = { zones: [zone("rib", 1), zone("rib", 3)] };
  expect(differences(before, after)).toEqual([{ path: "zones[rib 2].to", before: "2", after: "3" }]);
});

test("a curve is shown as a whole", () => {
  const found = differences(
    { points: [[3, 0.5]] },
    {
      points: [
        [3, 0.5],
        [10, 0.3],
      ],
    },
  );
  expect(found).toEqual([{ path: "points", before: "[[3, 0.5]]", after: "[[3, 0.5] [10, 0.3]]" }]);
});

test("what went has no after", () => {
  expect(differences({ note: "x" }, {})).toEqual([{ path: "note", before: "x", after: undefined }]);
});
