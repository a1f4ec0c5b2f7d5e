import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";
import type { LogChannel, LogPlan } from "#src/features/layer-log/reading-tracks.ts";
import type { Tone, Track, TrackSeries } from "#src/features/layer-log/track.ts";

/** One of two profiles that are laid over each other. */
export interface ComparedSide {
  name: string;
  plan: LogPlan;
  /** left out: nothing is predicted */
  prediction?: PredictionDocument;
}

/** Duties and predictions of two profiles on one part, the first as full lines, the second as broken ones. */
export function comparisonTracks(
  channels: readonly LogChannel[],
  sides: readonly [ComparedSide, ComparedSide],
  polymer: Polymer | undefined,
): Track[] {
  const twice = (tone: Tone, values: (side: ComparedSide) => Float64Array): TrackSeries[] =>
    sides.map((side, i) => ({
      label: side.name,
      values: values(side),
      style: { tone, line: i === 0 ? "solid" : "dashed" },
    }));
  const duties = channels
    .filter(({ id }) => sides.some(({ plan }) => plan.layers[0]?.duty[id] !== undefined))
    .map(({ id, kind }): Track => {
      const tone = kind === "fan" ? "cool" : "heat";
      return {
        id,
        title: `${kind === "fan" ? "Fan" : "Heater"} ${id}`,
        unit: "0–1",
        decimals: 2,
        domain: [0, 1],
        series: twice(tone, ({ plan }) => Float64Array.from(plan.layers, ({ duty }) => duty[id] ?? Number.NaN)),
      };
    });
  const count = sides[0].plan.layers.length;
  if (sides.some(({ prediction }) => prediction?.layers.length !== count)) return duties;
  const predicted = (of: (layer: PredictedLayer) => number) =>
    twice("ink", ({ prediction }) => Float64Array.from(prediction?.layers ?? [], of));
  const caution = sides.some(({ prediction }) => prediction?.calibration === "uncalibrated")
    ? "uncalibrated"
    : undefined;
  return [
    ...duties,
    {
      id: "interlayer",
      title: "Interlayer temperature",
      shortTitle: "Interlayer",
      unit: "°C",
      decimals: 0,
      series: predicted(({ interlayerC }) => interlayerC),
      references: polymer && [{ value: polymer.tgC.value, label: "Tg" }],
      caution,
    },
    ...(polymer?.crystallinity === null
      ? []
      : [
          {
            id: "crystallinity",
            title: "Crystallinity",
            unit: "0–1",
            decimals: 3,
            series: predicted(({ crystallinity }) => crystallinity),
            caution,
          },
        ]),
  ];
}
