import { expect, test } from "vitest";
import { comparisonTracks } from "#src/features/layer-log/comparison-tracks.ts";
import { cardOf, predictionOf } from "#tests/src/features/prediction/predictions.ts";

const CHANNELS = [
  { id: "part-fan", kind: "fan" as const },
  { id: "lamp", kind: "heater" as const },
  { id: "door-fan", kind: "fan" as const },
];
const plan = (duty: Record<string, number>) => ({ layers: [1, 2].map((index) => ({ index, duty, reason: {} })) });
const before = { name: "before", plan: plan({ "part-fan": 0.3, lamp: 0.5 }) };
const after = { name: "after", plan: plan({ "part-fan": 0.4 }) };

test("the first profile is drawn in full lines, the second in broken ones; a channel only one drives has a gap", () => {
  const tracks = comparisonTracks(CHANNELS, [before, after], undefined);
  expect(tracks.map(({ id }) => id)).toEqual(["part-fan", "lamp"]);
  expect(tracks[0].series.map(({ label, style }) => [label, style.line])).toEqual([
    ["before", "solid"],
    ["after", "dashed"],
  ]);
  expect(Array.from(tracks[1].series[1].values)).toEqual([Number.NaN, Number.NaN]);
});

test("predictions are laid over each other once both are there", () => {
  const half = comparisonTracks(CHANNELS, [{ ...before, prediction: predictionOf(2) }, after], cardOf("peek"));
  expect(half.map(({ id }) => id)).not.toContain("interlayer");
  const both = comparisonTracks(
    CHANNELS,
    [
      { ...before, prediction: predictionOf(2) },
      { ...after, prediction: predictionOf(2, () => ({ interlayerC: 160 })) },
    ],
    cardOf("peek"),
  );
  const interlayer = both.find(({ id }) => id === "interlayer");
  expect(interlayer?.series.map(({ values }) => values[1])).toEqual([102, 160]);
  expect(interlayer?.references).toEqual([{ value: 143, label: "Tg" }]);
});
