import { expect, test } from "vitest";
import { bandsOf, OUTLINE_BANDS, outlineOf } from "#shared/layers/outline.ts";

const layer = (zMm: number, left: number, right: number, heightMm = 0.2) => ({
  zMm,
  heightMm,
  boxMm: { min: [left, 0], max: [right, 1] },
});
const stack = (count: number, reach: (share: number) => [number, number]) =>
  Array.from({ length: count }, (_, i) => layer(0.2 * (i + 1), ...reach((i + 0.5) / count)));

test("a wide foot and a thin post keep their form", () => {
  const { widthMm, heightMm, bands } = outlineOf(stack(240, (share) => (share < 0.25 ? [10, 50] : [25, 35])));
  expect(widthMm).toBe(40);
  expect(heightMm).toBeCloseTo(48, 9);
  expect(bands).toHaveLength(OUTLINE_BANDS);
  expect(bands.slice(0, 6)).toEqual(Array.from({ length: 6 }, () => [0, 1]));
  expect(bands.slice(6)).toEqual(Array.from({ length: 18 }, () => [0.375, 0.625]));
});

test("two objects printed one after another stand side by side", () => {
  const { bands } = outlineOf([...stack(48, () => [0, 10]), ...stack(24, () => [30, 40])]);
  expect(bands[0]).toEqual([0, 1]);
  expect(bands[OUTLINE_BANDS - 1]).toEqual([0, 0.25]);
});

test("a part of few thick layers has no gaps, and one without width no bands", () => {
  expect(outlineOf([layer(1, 0, 10, 1), layer(2, 0, 5, 1)]).bands.every((band) => band !== null)).toBe(true);
  expect(outlineOf([layer(1, 5, 5)]).bands.some((band) => band !== null)).toBe(false);
  expect(outlineOf([]).widthMm).toBe(0);
});

test("a thin layer lies in one band, a thick one in all whose middle it covers", () => {
  expect(bandsOf(layer(0.2, 0, 1), 100)).toEqual([0, 0]);
  expect(bandsOf(layer(100, 0, 1), 100)).toEqual([OUTLINE_BANDS - 1, OUTLINE_BANDS - 1]);
  expect(bandsOf(layer(1, 0, 1, 1), 2)).toEqual([0, OUTLINE_BANDS / 2 - 1]);
  expect(bandsOf(layer(2, 0, 1, 1), 2)).toEqual([OUTLINE_BANDS / 2, OUTLINE_BANDS - 1]);
});
