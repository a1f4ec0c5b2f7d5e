import fc from "fast-check";
import { expect, test } from "vitest";
import { objectAt, positionAtHeight, positionOfIndex, stackLayers } from "#src/features/layer-log/layer-stack.ts";
import { layerOf, layersOf } from "#tests/src/layer-log/layers.ts";

test("a layer covers the height from the layer below it to its own top", () => {
  const stack = stackLayers(layersOf(3));
  expect([...stack.bottomMm]).toEqual([0, 0.2, 0.4]);
  expect([...stack.topMm]).toEqual([0.2, 0.4, 0.6]);
  expect(stack.totalMm).toBe(0.6);
});

test("objects printed one after the other stand upon each other in print order", () => {
  const stack = stackLayers([
    layerOf(1),
    layerOf(2),
    layerOf(3, { object: 2, zMm: 0.2 }),
    layerOf(4, { object: 2, zMm: 0.5 }),
  ]);
  expect(stack.objects).toEqual([
    { object: 1, baseMm: 0, topMm: 0.4, first: 0, last: 1 },
    { object: 2, baseMm: 0.4, topMm: 0.9, first: 2, last: 3 },
  ]);
  expect(objectAt(stack, 3).object).toBe(2);
});

test("a height on a border belongs to the layer below it, as zones count", () => {
  const stack = stackLayers(layersOf(3));
  expect(positionAtHeight(stack, 0.2)).toBe(0);
  expect(positionAtHeight(stack, 0.2001)).toBe(1);
});

test("heights outside the part belong to its lowest or highest layer; without layers to none", () => {
  const stack = stackLayers(layersOf(3));
  expect([-5, 0, 99].map((mm) => positionAtHeight(stack, mm))).toEqual([0, 0, 2]);
  expect(positionAtHeight(stackLayers([]), 1)).toBe(-1);
});

test("every height within a layer leads to that layer, whatever the layers' heights", () =>
  fc.assert(
    fc.property(
      fc.array(fc.double({ min: 0.05, max: 0.6, noNaN: true }), { minLength: 1, maxLength: 60 }),
      (heights) => {
        let zMm = 0;
        const stack = stackLayers(
          heights.map((heightMm, i) => {
            zMm += heightMm;
            return layerOf(i + 1, { heightMm, zMm });
          }),
        );
        for (let i = 0; i < stack.count; i++) {
          expect(positionAtHeight(stack, (stack.bottomMm[i] + stack.topMm[i]) / 2)).toBe(i);
        }
      },
    ),
  ));

test("layers are found by index, though indexes may have gaps", () => {
  const stack = stackLayers([layerOf(2), layerOf(5), layerOf(9)]);
  expect([2, 5, 9, 1, 6, 10].map((index) => positionOfIndex(stack, index))).toEqual([0, 1, 2, -1, -1, -1]);
});

test("a layer whose height is no number takes next to no room instead of upsetting the axis", () => {
  const stack = stackLayers([layerOf(1), layerOf(2, { zMm: Number.NaN }), layerOf(3)]);
  expect(stack.topMm[1]).toBeCloseTo(0.201);
  expect(stack.topMm[2]).toBeCloseTo(0.6);
});
