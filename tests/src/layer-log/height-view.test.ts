import fc from "fast-check";
import { expect, test } from "vitest";
import {
  fitRange,
  heightAt,
  isWhole,
  rangeShowing,
  wholeRange,
  yOf,
  zoomedAbout,
} from "#src/features/layer-log/height-view.ts";
import { stackLayers } from "#src/features/layer-log/layer-stack.ts";
import { layersOf } from "#tests/src/layer-log/layers.ts";

const stack = stackLayers(layersOf(100)); // 20 mm
const view = { fromMm: 5, toMm: 15, topPx: 20, bottomPx: 520 };

test("the part grows upward: a greater height lies higher on the screen", () => {
  expect(yOf(view, 5)).toBe(520);
  expect(yOf(view, 15)).toBe(20);
  expect(yOf(view, 10)).toBe(270);
});

test("pixel rows and heights convert into each other and back", () =>
  fc.assert(
    fc.property(fc.double({ min: 0, max: 20, noNaN: true }), (mm) => {
      expect(heightAt(view, yOf(view, mm))).toBeCloseTo(mm, 9);
    }),
  ));

test("a dragged band zooms whichever way it was drawn", () => {
  expect(fitRange(stack, { fromMm: 12, toMm: 8 })).toEqual(fitRange(stack, { fromMm: 8, toMm: 12 }));
});

test("a zoom never leaves the part and never shows fewer than four layers", () =>
  fc.assert(
    fc.property(
      fc.double({ min: -30, max: 50, noNaN: true }),
      fc.double({ min: -30, max: 50, noNaN: true }),
      (fromMm, toMm) => {
        const range = fitRange(stack, { fromMm, toMm });
        expect(range.fromMm).toBeGreaterThanOrEqual(0);
        expect(range.toMm).toBeLessThanOrEqual(20 + 1e-9);
        expect(range.toMm - range.fromMm).toBeGreaterThanOrEqual(0.8 - 1e-9);
      },
    ),
  ));

test("walking out of the view moves it just so far that the layer is seen", () => {
  const range = { fromMm: 5, toMm: 10 };
  expect(rangeShowing(stack, range, 7, 7.2)).toBe(range);
  expect(rangeShowing(stack, range, 10, 10.2)).toEqual({ fromMm: expect.closeTo(5.2), toMm: expect.closeTo(10.2) });
  expect(rangeShowing(stack, range, 4.8, 5)).toEqual({ fromMm: expect.closeTo(4.8), toMm: expect.closeTo(9.8) });
});

test("zooming keeps the height it is about in its place", () => {
  const zoomed = zoomedAbout(stack, { fromMm: 4, toMm: 12 }, 6, 0.5);
  expect(zoomed).toEqual({ fromMm: 5, toMm: 9 });
  expect(isWhole(stack, zoomedAbout(stack, zoomed, 6, 100))).toBe(true);
  expect(isWhole(stack, zoomed)).toBe(false);
});

test("without layers there is still an axis", () => {
  expect(wholeRange(stackLayers([]))).toEqual({ fromMm: 0, toMm: 1 });
});
