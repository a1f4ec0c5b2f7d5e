import type { PlanDocument } from "#shared/formats/plan.ts";
import type { LayerReading } from "#shared/formats/reading.ts";
import type { Tone, Track, TrackSeries } from "#src/features/layer-log/track.ts";

/** A layer of the log: a layer of the reading. */
export type LogLayer = LayerReading;

/** One output of the machine, as far as the log cares. */
export interface LogChannel {
  id: string;
  kind: "fan" | "heater";
}

/** What of a plan is drawn: a finished plan, or the one just computed while a profile is edited. */
export type LogPlan = Pick<PlanDocument, "layers">;

/** The tracks that a reading gives: layer time, deposited length, and one for every fan and heater. */
export function readingTracks(layers: readonly LogLayer[], channels: readonly LogChannel[]): Track[] {
  return [...measureTracks(layers), ...channels.map((channel) => dutyTrack(channel, channels, layers))];
}

/** The same with what is planned in them: a plan changes many times while a profile is edited, a reading never. */
export function withPlan(tracks: readonly Track[], plan: LogPlan | undefined): Track[] {
  return tracks.map((track) => {
    const [sliced] = track.series;
    if (plan?.layers[0]?.duty[track.id] === undefined || sliced.label !== SLICED) return track;
    return { ...track, series: [sliced, plannedSeries(track.id, sliced.style.tone, plan)] };
  });
}

const SLICED = "as sliced";
/** The only line of its track: it needs no sample to be told from another. */
export const MEASURED = "in the file";

function measureTracks(layers: readonly LogLayer[]): Track[] {
  const measure = (
    id: string,
    title: string,
    unit: string,
    decimals: number,
    of: (layer: LogLayer) => number,
  ): Track => {
    const values = Float64Array.from(layers, of);
    return {
      id,
      title,
      unit,
      decimals,
      // Layers of one part may differ a hundredfold, and of another hardly: one kind of axis for all of them.
      scale: "log",
      series: [{ label: MEASURED, values, style: { tone: "ink", line: "solid", fill: "wash" } }],
    };
  };
  return [
    measure("layer-time", "Layer time", "s", 1, ({ timeS }) => timeS),
    measure("deposited-length", "Deposited length", "mm", 0, ({ depositedLengthMm }) => depositedLengthMm),
  ];
}

function dutyTrack({ id, kind }: LogChannel, channels: readonly LogChannel[], layers: readonly LogLayer[]): Track {
  const tone = kind === "fan" ? "cool" : "heat";
  const seen = (pick: "mean" | "min" | "max") =>
    Float64Array.from(layers, ({ duty }) => duty[id]?.[pick] ?? Number.NaN);
  const [low, high] = [seen("min"), seen("max")];
  const sliced: TrackSeries = {
    label: SLICED,
    values: seen("mean"),
    style: { tone, line: "dashed" },
    ...(low.some((least, i) => high[i] > least) ? { low, high } : {}),
  };
  const alike = channels.filter((channel) => channel.kind === kind).length;
  return {
    id,
    title: alike > 1 ? `${kind === "fan" ? "Fan" : "Heater"} ${id}` : kind === "fan" ? "Fan duty" : "Heater duty",
    unit: "0–1",
    decimals: 2,
    domain: [0, 1],
    series: [sliced],
  };
}

function plannedSeries(id: string, tone: Tone, { layers }: LogPlan): TrackSeries {
  const values = new Float64Array(layers.length);
  for (let i = 0; i < layers.length; i++) values[i] = layers[i].duty[id] ?? Number.NaN;
  return { label: "as planned", values, style: { tone, line: "solid", fill: "wash" } };
}
