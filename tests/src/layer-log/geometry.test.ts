import { expect, test } from "vitest";
import { heightMarks, layerMarks } from "#src/features/layer-log/axis-marks.ts";
import { stackLayers } from "#src/features/layer-log/layer-stack.ts";
import { logLayout } from "#src/features/layer-log/log-layout.ts";
import { rangeRuns } from "#src/features/layer-log/range-runs.ts";
import { sectionOf } from "#src/features/layer-log/section.ts";
import { zoneBands } from "#src/features/layer-log/zone-bands.ts";
import { layerOf, layersOf } from "#tests/src/layer-log/layers.ts";

const view = (toMm: number, fromMm = 0) => ({ fromMm, toMm, topPx: 0, bottomPx: 500 });

test("heights are marked with equal decimals, in each object from its own bed", () => {
  const stack = stackLayers([
    ...layersOf(50),
    ...layersOf(50).map((layer) => ({ ...layer, index: layer.index + 50, object: 2 })),
  ]);
  const marks = heightMarks(stack, view(20));
  expect(marks.map(({ text }) => text)).toEqual(["0", "2", "4", "6", "8", "10", "2", "4", "6", "8", "10"]);
  expect(marks[6].y).toBe(500 - (12 / 20) * 500);
  expect(heightMarks(stackLayers(layersOf(5)), view(1)).map(({ text }) => text)[1]).toBe("0.1");
});

test("layer numbers are round, stand at the middle of their layers, and never crowd", () => {
  const marks = layerMarks(stackLayers(layersOf(300)), view(60));
  expect(marks.slice(0, 3).map(({ text }) => text)).toEqual(["50", "100", "150"]);
  expect(marks[0].y).toBeCloseTo(500 - (9.9 / 60) * 500);
  const close = layerMarks(stackLayers(layersOf(300)), view(1));
  expect(close.map(({ text }) => text)).toEqual(["1", "2", "3", "4", "5"]);
});

test("columns fill the width, do not overlap, and keep a least width where there is not enough of it", () => {
  for (const [width, tracks, aside] of [
    [1400, 7, 134],
    [680, 4, 134],
    [300, 6, 0],
  ]) {
    const layout = logLayout(width, tracks, aside);
    const columns = [
      layout.axis,
      layout.silhouette,
      ...layout.tracks,
      layout.marks,
      ...(layout.aside ? [layout.aside] : []),
    ];
    for (let i = 1; i < columns.length; i++) {
      expect(columns[i].x).toBeGreaterThanOrEqual(columns[i - 1].x + columns[i - 1].width);
      expect(columns[i].width).toBeGreaterThan(0);
    }
    expect(layout.tracks.every((track) => track.width >= 62)).toBe(true);
    expect(layout.width).toBeGreaterThanOrEqual(width);
  }
});

test("the silhouette looks at the side whose width changes with height", () => {
  const tapering = layersOf(10, (i) => ({ boxMm: { min: [0, i], max: [50, 40 - i] }, areaMm2: 50 * (40 - 2 * i) }));
  expect(sectionOf(tapering)).toMatchObject({ across: "Y", fromMm: 0, toMm: 40 });
});

test("a plate is solid, a ring is open in the middle, and walls are never too thin to show their fill", () => {
  const box = { min: [0, 0] as [number, number], max: [20, 20] as [number, number] };
  const open = sectionOf([
    layerOf(1, { boxMm: box, areaMm2: 390 }),
    layerOf(2, { boxMm: box, areaMm2: 150 }),
    layerOf(3, { boxMm: box, areaMm2: 1 }),
  ]).open;
  expect(open[0]).toBe(0);
  expect(open[1]).toBeGreaterThan(0.5);
  expect(open[2]).toBeLessThanOrEqual(0.84);
});

test("zones lie at their heights, the first from the bed and the last up to the top", () => {
  const zones = [
    { name: "base", from: 0, to: 6, unit: "mm" as const, target: "semi-crystalline" as const },
    { name: "lip", from: 6, unit: "mm" as const, target: "amorphous" as const, rampMm: 0.6 },
  ];
  expect(zoneBands(zones, stackLayers(layersOf(45)))).toEqual([
    { zone: 0, name: "base", target: "semi-crystalline", fromMm: 0, toMm: 6, rampMm: 0 },
    { zone: 1, name: "lip", target: "amorphous", fromMm: 6, toMm: 9, rampMm: 0.6 },
  ]);
});

test("zones by layer end on that layer's top, zones by fraction at that share of each object", () => {
  const two = stackLayers([
    ...layersOf(10),
    ...layersOf(20).map((layer) => ({ ...layer, index: layer.index + 10, object: 2 })),
  ]);
  const half = { from: 0, to: 0.5, unit: "fraction" as const, name: "a", target: "none" as const };
  const rest = { ...half, from: 0.5, to: undefined, name: "b" };
  expect(zoneBands([half, rest], two).map(({ fromMm, toMm }) => [fromMm, toMm])).toEqual([
    [0, 1],
    [1, 2],
    [2, 4],
    [4, 6],
  ]);
  const four = { ...half, unit: "layer" as const, to: 4 };
  expect(
    zoneBands([four, { ...rest, unit: "layer" as const, from: 4 }], two).map(({ zone, toMm }) => [zone, toMm]),
  ).toEqual([
    [0, expect.closeTo(0.8)],
    [1, 2],
    [1, 6],
  ]);
});

test("a zone that begins above the part has no band", () => {
  const zones = [
    { name: "a", from: 0, to: 30, unit: "mm" as const, target: "none" as const },
    { name: "b", from: 30, unit: "mm" as const, target: "none" as const },
  ];
  expect(zoneBands(zones, stackLayers(layersOf(5))).map(({ name }) => name)).toEqual(["a"]);
});

test("duties that change within layers form one strip for layers that follow each other", () => {
  const low = [0.2, 0.2, 0.3, 0.2, 0.2];
  const high = [0.2, 0.9, 0.9, 0.2, 0.8];
  const runs = rangeRuns(low, high, stackLayers(layersOf(5)), view(1), 1);
  expect(runs).toEqual([
    [0.2, 0.9, 400, 300, 0.3, 0.9, 300, 200].map((each) => expect.closeTo(each, 6)),
    [0.2, 0.8, 100, 0].map((each) => expect.closeTo(each, 6)),
  ]);
});
