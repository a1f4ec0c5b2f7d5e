import type { Layer } from "#shared/layers/reading.ts";

/** What planning needs to know of a layer; the second part only where a rule holds, and what is left out is then assumed. */
export type PlanLayer = Pick<Layer, "index" | "object" | "zMm" | "heightMm" | "timeS" | "depositedLengthMm"> &
  Partial<Pick<Layer, "areaMm2" | "outlineMm" | "nozzleC" | "bedC" | "waits" | "duty">>;

/** `quenchline.plan/1`: the duties of every layer, each with the steps that led to it. */
export interface Plan {
  format: "quenchline.plan/1";
  /** in print order, one for every layer of the reading */
  layers: PlannedLayer[];
  /** in the order of the layers they begin at */
  advice: Advice[];
}

export interface PlannedLayer {
  index: number;
  /** by channel id, 0-1, each a whole number of the drive's steps */
  duty: Record<string, number>;
  /** by channel id, in the order in which the steps were taken, never empty */
  reason: Record<string, string[]>;
}

/** What fan and heater cannot put right, or could not follow. One entry stands for a run of layers. */
export interface Advice {
  /** index of the first layer concerned; the message names the range */
  layer: number;
  code: AdviceCode | HoldAdviceCode | MaterialAdviceCode | TuningAdviceCode;
  message: string;
}

export type AdviceCode =
  | "layer-time-unknown"
  | "layer-too-short"
  | "below-curve"
  | "above-curve"
  | "saturated"
  | "dead-band"
  | "change-limited"
  | "change-below-step"
  | "end-ramp-not-held"
  | "rate-too-slow";

/** What a layer that is held does not reach. */
export type HoldAdviceCode =
  | "hold-too-warm"
  | "hold-too-cold"
  | "hold-not-solid"
  | "hold-no-weld"
  | "hold-crystalline"
  | "hold-not-crystalline"
  | "hold-elsewhere";

/** What shows only when the plan is laid over the file. */
export type TuningAdviceCode = "boost-left-out" | "raises-kept" | "output-shared";

/** Set-points of the file that do not go with the polymer, and a polymer card that nobody chose. */
export type MaterialAdviceCode = "nozzle-below-melting" | "nozzle-unknown" | "card-shipped";
