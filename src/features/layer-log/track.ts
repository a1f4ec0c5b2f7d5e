import type { Severity } from "#src/lib/remarks.ts";

/** What the colour of a line stands for: a measure, cooling, heating, or a state. */
export type Tone = "ink" | "cool" | "heat" | "amber" | "bone";

/** How a series is drawn. What it is must show without colour: by line, and by fill. */
export interface SeriesStyle {
  tone: Tone;
  /** solid for what is measured or planned, dashed for what the sliced file has, dotted for what is predicted */
  line: "solid" | "dashed" | "dotted";
  /** the area from the track's left edge to the line */
  fill?: "wash" | "hatch";
}

export interface TrackSeries {
  label: string;
  /** one value for every layer, in print order; NaN where there is none */
  values: ArrayLike<number>;
  style: SeriesStyle;
  /** range around the values, drawn as a hatched strip: a duty that changes within the layer, or what is uncertain */
  low?: ArrayLike<number>;
  high?: ArrayLike<number>;
  /** the range belongs to the value: table and voice give it too */
  uncertain?: boolean;
}

/** Where a track's value is meant to lie: a band in the state's fill, with a line at each end that is not open. */
export interface TrackWindow {
  state: "amorphous" | "semi-crystalline";
  /** an open end is infinite */
  low: number;
  high: number;
  /** the layers for which this is wanted: first and last position of every run */
  runs: readonly (readonly [first: number, last: number])[];
}

/** One narrow strip of the layer log. */
export interface Track {
  id: string;
  title: string;
  /** stands at the head of a track too narrow for the title */
  shortTitle?: string;
  unit: string;
  series: TrackSeries[];
  /** values at the track's left and right edge; left out: from the data */
  domain?: [number, number];
  /** logarithmic where values span decades; left out: linear, from 0 */
  scale?: "linear" | "log";
  decimals?: number;
  /** values with a line through the whole track, such as Tg */
  references?: { value: number; label: string }[];
  windows?: TrackWindow[];
  /** a word under the title that says how far the values may be trusted */
  caution?: string;
  /** the values belong to an older plan, and the new ones are on their way */
  pale?: boolean;
}

/** Something worth a look at a layer: a finding of the reading, or advice of the plan. */
export interface LogMark {
  /** index of the layer */
  layer: number;
  severity: Severity;
  message: string;
}
