import { expect, test } from "vitest";
import { readingTracks, withPlan } from "#src/features/layer-log/reading-tracks.ts";
import { trackText } from "#src/features/layer-log/value-text.ts";
import { layersOf } from "#tests/src/layer-log/layers.ts";

const CHANNELS = [
  { id: "part-fan", kind: "fan" as const },
  { id: "lamp", kind: "heater" as const },
];
const planOf = (count: number) => ({
  layers: Array.from({ length: count }, (_, i) => ({
    index: i + 1,
    duty: { "part-fan": 0.5, lamp: 0.62 },
    reason: {},
  })),
});

test("a reading gives layer time, deposited length and a track for every channel", () => {
  expect(readingTracks(layersOf(3), CHANNELS).map(({ title, unit }) => `${title} ${unit}`)).toEqual([
    "Layer time s",
    "Deposited length mm",
    "Fan duty 0–1",
    "Heater duty 0–1",
  ]);
});

test("two fans are told apart by their ids", () => {
  const titles = readingTracks(layersOf(3), [...CHANNELS, { id: "side", kind: "fan" }]).map(({ title }) => title);
  expect(titles.slice(2)).toEqual(["Fan part-fan", "Heater duty", "Fan side"]);
});

test("as sliced and as planned differ by their line, not by colour alone", () => {
  const fan = withPlan(readingTracks(layersOf(3), CHANNELS), planOf(3))[2];
  expect(fan.series.map(({ label, style }) => [label, style.line])).toEqual([
    ["as sliced", "dashed"],
    ["as planned", "solid"],
  ]);
  expect(new Set(fan.series.map(({ style }) => style.tone)).size).toBe(1);
});

test("a channel that the plan does not drive has no planned line", () => {
  const plan = { layers: planOf(3).layers.map((layer) => ({ ...layer, duty: { "part-fan": 0.5 } })) };
  expect(withPlan(readingTracks(layersOf(3), CHANNELS), plan)[3].series).toHaveLength(1);
});

test("a range is drawn only where a duty changes within a layer", () => {
  const raised = layersOf(3, (i) => ({
    duty: { "part-fan": { mean: 0.5, min: 0.4, max: i === 1 ? 0.9 : 0.4, commands: 2 } },
  }));
  expect(readingTracks(raised, CHANNELS)[2].series[0].high).toEqual(Float64Array.of(0.4, 0.9, 0.4));
  expect(readingTracks(layersOf(3), CHANNELS)[2].series[0].high).toBeUndefined();
});

test("values are read out with their units, series by name where there are several", () => {
  const tracks = withPlan(readingTracks(layersOf(3), CHANNELS), planOf(3));
  expect(trackText(tracks[0], 1)).toBe("Layer time 12.0 s");
  expect(trackText(tracks[2], 1)).toBe("Fan duty as sliced 0.40, as planned 0.50");
});
