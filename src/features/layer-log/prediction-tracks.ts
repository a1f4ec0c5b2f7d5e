import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";
import type { Margins } from "#shared/formats/profile.ts";
import type { LayerTarget } from "#shared/plan/layer-targets.ts";
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
  /** the prediction belongs to an older plan */
  pale?: boolean;
}

/** Interlayer temperature and, where anything crystallises, crystallinity, each with where its target wants it. */
export function predictionTracks(input: PredictionTracksInput): Track[] {
  const tracks = [interlayerTrack(input)];
  return input.polymer.crystallinity === null ? tracks : [...tracks, crystallinityTrack(input)];
}

/** The card's margins with the profile's laid over them, as plain numbers. */
export function marginsOf({ margins }: Polymer, own: Margins = {}): Required<Margins> {
  return {
    belowTgC: own.belowTgC ?? margins.belowTgC.value,
    aboveTgC: own.aboveTgC ?? margins.aboveTgC.value,
    maxCrystallinity: own.maxCrystallinity ?? margins.maxCrystallinity.value,
    minCrystallinity: own.minCrystallinity ?? margins.minCrystallinity.value,
  };
}

function interlayerTrack({ polymer, margins, targets, prediction, pale }: PredictionTracksInput): Track {
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
      amorphous: { low: domain[0], high: tgC - belowTgC, edge: "high" },
      "semi-crystalline": { low: tgC + aboveTgC, high: domain[1], edge: "low" },
    }),
    caution: cautionOf(prediction),
    pale,
  };
}

function crystallinityTrack({ polymer, margins, targets, prediction, pale }: PredictionTracksInput): Track {
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
      amorphous: { low: 0, high: maxCrystallinity, edge: "high" },
      "semi-crystalline": { low: minCrystallinity, high: domain[1], edge: "low" },
    }),
    caution: cautionOf(prediction),
    pale,
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
  const column = (of: (layer: PredictedLayer) => number) =>
    usable ? Float64Array.from(usable, of) : new Float64Array(count).fill(Number.NaN);
  const plain: TrackSeries = { label: "predicted", values: column(value), style: { tone: "ink", line: "dotted" } };
  if (!usable?.some((layer) => band(layer) !== undefined)) return plain;
  return {
    ...plain,
    low: column((layer) => band(layer)?.[0] ?? Number.NaN),
    high: column((layer) => band(layer)?.[1] ?? Number.NaN),
    uncertain: true,
  };
}

type Bounds = Record<TrackWindow["state"], { low: number; high: number; edge: TrackWindow["edge"] }>;

function windowsOf(targets: readonly LayerTarget[], bounds: Bounds): TrackWindow[] {
  return (["amorphous", "semi-crystalline"] as const)
    .filter((state) => targets.some((target) => target.state === state))
    .map((state) => {
      const { low, high, edge } = bounds[state];
      const column = (value: number) =>
        Float64Array.from(targets, (target) => (target.state === state ? value : Number.NaN));
      return { state, low: column(low), high: column(high), edge };
    });
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
