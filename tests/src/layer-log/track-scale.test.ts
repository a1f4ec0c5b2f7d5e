import { expect, test } from "vitest";
import type { Track } from "#src/features/layer-log/track.ts";
import { trackScale } from "#src/features/layer-log/track-scale.ts";

const trackOf = (values: number[], changes: Partial<Track> = {}): Track => ({
  id: "t",
  title: "T",
  unit: "s",
  series: [{ label: "in the file", values, style: { tone: "ink", line: "solid" } }],
  ...changes,
});

test("a linear track begins at 0 and ends at a round value above the data", () => {
  expect(trackScale(trackOf([12, 36.4]))).toEqual({ kind: "linear", from: 0, to: 40 });
});

test("values below 0 have room too", () => {
  expect(trackScale(trackOf([-12, 30]))).toMatchObject({ from: -20, to: 40 });
});

test("a reference such as Tg lies within the track even where no value comes near it", () => {
  expect(trackScale(trackOf([20, 60], { references: [{ value: 143, label: "Tg" }] })).to).toBeGreaterThanOrEqual(143);
});

test("a logarithmic track begins at a decade and never ends below its greatest value", () => {
  expect(trackScale(trackOf([1.7, 139], { scale: "log" }))).toEqual({ kind: "log", from: 1, to: 200 });
  expect(trackScale(trackOf([0, 0], { scale: "log" }))).toMatchObject({ kind: "linear" });
});

test("a given domain holds whatever the data", () => {
  expect(trackScale(trackOf([7], { domain: [0, 1] }))).toEqual({ kind: "linear", from: 0, to: 1 });
});

test("without a single value there is still a scale", () => {
  expect(trackScale(trackOf([]))).toEqual({ kind: "linear", from: 0, to: 1 });
  expect(trackScale(trackOf([Number.NaN]))).toEqual({ kind: "linear", from: 0, to: 1 });
});
