import { expect, test } from "vitest";
import type { LayerTarget } from "#shared/plan/layer-targets.ts";
import { marginsOf } from "#shared/polymers/material.ts";
import { predictionTracks } from "#src/features/layer-log/prediction-tracks.ts";
import { trackText } from "#src/features/layer-log/value-text.ts";
import { cardOf, predictionOf } from "#tests/src/features/prediction/predictions.ts";

const peek = cardOf("peek");
const targets: LayerTarget[] = [
  { state: "semi-crystalline", share: 1 },
  { state: "none", share: Number.NaN },
  { state: "amorphous", share: 0 },
];

test("the interlayer track has Tg, the solidification limit and the window of each target", () => {
  const [track] = predictionTracks({ polymer: peek, targets, prediction: predictionOf(3) });
  expect(track.references).toEqual([
    { value: 143, label: "Tg" },
    { value: 173, label: "solid" },
  ]);
  expect(track.windows).toEqual([
    { state: "amorphous", low: Number.NEGATIVE_INFINITY, high: 143 - 15, runs: [[2, 2]] },
    { state: "semi-crystalline", low: 143 + 15, high: Number.POSITIVE_INFINITY, runs: [[0, 0]] },
  ]);
});

test("layers in a row that want the same are one run of its window", () => {
  const turns = [0, 0, 1, 1, 1, 0].map(
    (share): LayerTarget => ({ state: share ? "semi-crystalline" : "amorphous", share }),
  );
  const [{ windows = [] }] = predictionTracks({ polymer: peek, targets: turns });
  expect(windows.map(({ runs }) => runs)).toEqual([
    [
      [0, 1],
      [5, 5],
    ],
    [[2, 4]],
  ]);
});

test("every value, band and edge of a window lies within the scale", () => {
  for (const track of predictionTracks({ polymer: peek, targets, prediction: predictionOf(3) })) {
    const [from, to] = track.domain ?? [0, 0];
    const { values, low, high } = track.series[0];
    const windows = (track.windows ?? []).flatMap((window) => [window.low, window.high].filter(Number.isFinite));
    for (const value of [...Array.from(values), ...Array.from(low ?? []), ...Array.from(high ?? []), ...windows]) {
      if (Number.isNaN(value)) continue;
      expect(value).toBeGreaterThanOrEqual(from);
      expect(value).toBeLessThanOrEqual(to);
    }
  }
});

test("the profile's margins go before the card's", () => {
  expect(marginsOf(peek, { belowTgC: 30 })).toEqual({
    belowTgC: 30,
    aboveTgC: 15,
    maxCrystallinity: 0.08,
    minCrystallinity: 0.2,
  });
  const [track] = predictionTracks({ polymer: peek, margins: { belowTgC: 30 }, targets, prediction: predictionOf(3) });
  expect(track.windows?.[0].high).toBe(113);
});

test("without a prediction the tracks stand empty, and one of another part is not drawn", () => {
  for (const prediction of [undefined, predictionOf(7)]) {
    const tracks = predictionTracks({ polymer: peek, targets, prediction });
    expect(tracks.map(({ id }) => id)).toEqual(["interlayer", "crystallinity"]);
    expect(Array.from(tracks[0].series[0].values)).toEqual([Number.NaN, Number.NaN, Number.NaN]);
  }
});

test("without a band there is no range around the line", () => {
  const [track] = predictionTracks({ polymer: peek, targets, prediction: predictionOf(3, () => ({ band: null })) });
  expect(track.series[0].low).toBeUndefined();
});

test("what does not crystallise has no track of crystallinity", () => {
  const tracks = predictionTracks({ polymer: cardOf("pei"), targets, prediction: predictionOf(3) });
  expect(tracks.map(({ id }) => id)).toEqual(["interlayer"]);
});

test("the voice reads the band with the value", () => {
  const [track] = predictionTracks({ polymer: peek, targets, prediction: predictionOf(3) });
  expect(trackText(track, 1)).toBe("Interlayer temperature 102 °C, between 82 and 132");
});
