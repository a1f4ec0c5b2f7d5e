import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";
import type { Margins } from "#shared/formats/profile.ts";
import type { LayerTarget } from "#shared/plan/layer-targets.ts";
import { marginsOf } from "#shared/polymers/material.ts";
import type { Track, TrackSeries, TrackWindow } from "#src/features/layer-log/track.ts";
import { multiples, niceStep } from "#src/lib/scale.ts";

export interface PredictionTracksInput {
  polymer: Polymer;
  /** the profile's own margins; what is left out stays as the card says */
  margins?: Margins;
  /** what is wanted of every layer, by position */
  targets: readonly LayerTarget[];
  /** one layer for every target; left out: it is on its way, and the tracks stand empty */
  prediction?: PredictionDocument;
}

/** Interlayer temperature and, where anything crystallises, crystallinity, each with where its target wants it. */
export function predictionTracks(input: PredictionTracksInput): Track[] {
  const tracks = [interlayerTrack(input)];
  return input.polymer.crystallinity === null ? tracks : [...tracks, crystallinityTrack(input)];
}

function interlayerTrack({ polymer, margins, targets, prediction }: PredictionTracksInput): Track {
  const { belowTgC, aboveTgC } = marginsOf(polymer, margins);
  const [tgC, solidC] = [polymer.tgC.value, polymer.solidBelowC.value];
  const series = predictedSeries(
    targets.length,
    prediction?.layers,
    (layer) => layer.interlayerC,
    (layer) => layer.band?.interlayerC,
  );
  const domain = niceDomain([tgC - belowTgC, tgC + aboveTgC, solidC, ...edgesOf(series)], 6);
  return {
    id: "interlayer",
    title: "Interlayer temperature",
    shortTitle: "Interlayer",
    unit: "°C",
    decimals: 0,
    domain,
    series: [series],
    references: [
      { value: tgC, label: "Tg" },
      { value: solidC, label: "solid" },
    ],
    windows: windowsOf(targets, {
      amorphous: { low: Number.NEGATIVE_INFINITY, high: tgC - belowTgC },
      "semi-crystalline": { low: tgC + aboveTgC, high: Number.POSITIVE_INFINITY },
    }),
    caution: cautionOf(prediction),
  };
}

function crystallinityTrack({ polymer, margins, targets, prediction }: PredictionTracksInput): Track {
  const { maxCrystallinity, minCrystallinity } = marginsOf(polymer, margins);
  const series = predictedSeries(
    targets.length,
    prediction?.layers,
    (layer) => layer.crystallinity,
    (layer) => layer.band?.crystallinity,
  );
  const attainable = polymer.crystallinity?.attainable.value ?? 0;
  const domain = niceDomain([0, attainable, minCrystallinity, ...edgesOf(series)], 4);
  return {
    id: "crystallinity",
    title: "Crystallinity",
    unit: "0–1",
    decimals: 2,
    domain,
    series: [series],
    windows: windowsOf(targets, {
      amorphous: { low: Number.NEGATIVE_INFINITY, high: maxCrystallinity },
      "semi-crystalline": { low: minCrystallinity, high: Number.POSITIVE_INFINITY },
    }),
    caution: cautionOf(prediction),
  };
}

const cautionOf = (prediction: PredictionDocument | undefined): string | undefined =>
  prediction?.calibration === "uncalibrated" ? "uncalibrated" : undefined;

/** A prediction with another number of layers belongs to another part: it is not drawn. */
function predictedSeries(
  count: number,
  layers: readonly PredictedLayer[] | undefined,
  value: (layer: PredictedLayer) => number,
  band: (layer: PredictedLayer) => readonly [number, number] | undefined,
): TrackSeries {
  const usable = layers?.length === count ? layers : undefined;
  const column = (of: (layer: PredictedLayer) => number) => {
    const values = new Float64Array(count).fill(Number.NaN);
    for (let i = 0; usable && i < count; i++) values[i] = of(usable[i]);
    return values;
  };
  const plain: TrackSeries = { label: "predicted", values: column(value), style: { tone: "ink", line: "dotted" } };
  if (!usable?.some((layer) => band(layer) !== undefined)) return plain;
  return {
    ...plain,
    low: column((layer) => band(layer)?.[0] ?? Number.NaN),
    high: column((layer) => band(layer)?.[1] ?? Number.NaN),
    uncertain: true,
  };
}

type Bounds = Record<TrackWindow["state"], { low: number; high: number }>;

function windowsOf(targets: readonly LayerTarget[], bounds: Bounds): TrackWindow[] {
  return (["amorphous", "semi-crystalline"] as const)
    .map((state) => ({ state, ...bounds[state], runs: runsOf(targets, state) }))
    .filter(({ runs }) => runs.length > 0);
}

function runsOf(targets: readonly LayerTarget[], state: TrackWindow["state"]): [number, number][] {
  const runs: [number, number][] = [];
  for (let i = 0; i < targets.length; i++) {
    if (targets[i].state !== state) continue;
    const last = runs[runs.length - 1];
    if (last?.[1] === i - 1) last[1] = i;
    else runs.push([i, i]);
  }
  return runs;
}

function edgesOf({ values, low, high }: TrackSeries): number[] {
  let [least, most] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const column of [values, low ?? [], high ?? []]) {
    for (let i = 0; i < column.length; i++) {
      if (column[i] < least) least = column[i];
      if (column[i] > most) most = column[i];
    }
  }
  return least <= most ? [least, most] : [];
}

/** A scale in whole steps around all of these, with room at both ends. */
function niceDomain(values: readonly number[], parts: number): [number, number] {
  const [least, most] = [Math.min(...values), Math.max(...values)];
  const step = niceStep(most - least || 1, parts);
  const around = multiples(least - step, most + step, step);
  const from = around.filter((at) => at <= least + step * 1e-9).at(-1) ?? least;
  const to = around.find((at) => at >= most - step * 1e-9) ?? most;
  return [from, to > from ? to : from + step];
}
