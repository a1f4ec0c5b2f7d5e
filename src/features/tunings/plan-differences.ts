import type { PlanDocument } from "#shared/formats/plan.ts";
import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";

export interface PlanSide {
  plan: Pick<PlanDocument, "layers">;
  /** left out: nothing is predicted */
  prediction?: Pick<PredictionDocument, "layers">;
}

/** Least and greatest of something over a run of layers. */
export type Span = [least: number, most: number];

/** Layers in a row in which two plans differ in the same way. */
export interface DifferenceRun {
  /** indices of the first and last layer */
  first: number;
  last: number;
  count: number;
  /** channels whose duty differs; undefined on a side that doesn't drive it. None where only heat from below differs */
  channels: { id: string; before: Span | undefined; after: Span | undefined }[];
  /** after minus before; undefined where either is not predicted */
  interlayerC: Span | undefined;
  crystallinity: Span | undefined;
  states: { before: PredictedLayer["verdicts"]["state"]; after: PredictedLayer["verdicts"]["state"] } | undefined;
}

/** A change of temperature below this is not worth a line of its own, K. */
const LEAST_K = 1;

/**
 * Where two plans of one part differ, from the bottom up; both have a layer for every layer of the part. A run goes on
 * while layers differ and the two states stay the same.
 */
export function planDifferences(before: PlanSide, after: PlanSide): DifferenceRun[] {
  const channels = [...new Set([before, after].flatMap(({ plan }) => Object.keys(plan.layers[0]?.duty ?? {})))];
  const differs = (i: number): boolean =>
    channels.some((id) => dutyOf(before, id, i) !== dutyOf(after, id, i)) ||
    stateOf(before, i) !== stateOf(after, i) ||
    Math.abs(change(before, after, "interlayerC", i) ?? 0) >= LEAST_K;
  const runs: [first: number, last: number][] = [];
  for (let i = 0; i < before.plan.layers.length; i++) {
    if (!differs(i)) continue;
    const run = runs[runs.length - 1];
    const goesOn =
      run?.[1] === i - 1 &&
      stateOf(before, i) === stateOf(before, i - 1) &&
      stateOf(after, i) === stateOf(after, i - 1);
    if (goesOn) run[1] = i;
    else runs.push([i, i]);
  }
  return runs.map(([first, last]) => described(before, after, channels, first, last));
}

const dutyOf = ({ plan }: PlanSide, id: string, i: number): number | undefined => plan.layers[i].duty[id];
const stateOf = ({ prediction }: PlanSide, i: number) => prediction?.layers[i].verdicts.state;

function change(before: PlanSide, after: PlanSide, of: "interlayerC" | "crystallinity", i: number): number | undefined {
  const [was, is] = [before.prediction?.layers[i], after.prediction?.layers[i]];
  return was && is && is[of] - was[of];
}

function described(
  before: PlanSide,
  after: PlanSide,
  channels: readonly string[],
  first: number,
  last: number,
): DifferenceRun {
  const over = (value: (i: number) => number | undefined) => spanOf(first, last, value);
  const [wasState, isState] = [stateOf(before, first), stateOf(after, first)];
  return {
    first: before.plan.layers[first].index,
    last: before.plan.layers[last].index,
    count: last - first + 1,
    channels: channels
      .map((id) => ({ id, before: over((i) => dutyOf(before, id, i)), after: over((i) => dutyOf(after, id, i)) }))
      .filter(({ id }) => over((i) => (dutyOf(before, id, i) === dutyOf(after, id, i) ? undefined : i)) !== undefined),
    interlayerC: over((i) => change(before, after, "interlayerC", i)),
    crystallinity: over((i) => change(before, after, "crystallinity", i)),
    states: wasState && isState && { before: wasState, after: isState },
  };
}

/** Least and greatest value over a run; undefined where there is none. */
function spanOf(first: number, last: number, value: (i: number) => number | undefined): Span | undefined {
  let span: Span | undefined;
  for (let i = first; i <= last; i++) {
    const at = value(i);
    if (at !== undefined) span = span ? [Math.min(span[0], at), Math.max(span[1], at)] : [at, at];
  }
  return span;
}
