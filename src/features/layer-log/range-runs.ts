import type { HeightView } from "#src/features/layer-log/height-view.ts";
import type { LayerStack } from "#src/features/layer-log/layer-stack.ts";
import { traceSeries } from "#src/features/layer-log/trace.ts";

/** A stretch without gaps in which a value changes within its layers: quadruples of low, high, lower and upper edge. */
export type RangeRun = number[];

/** Where `high` lies above `low`, run by run from the bottom up; by layers, or by pixel rows where layers are thin. */
export function rangeRuns(
  low: ArrayLike<number>,
  high: ArrayLike<number>,
  stack: LayerStack,
  view: HeightView,
  rowPx: number,
): RangeRun[] {
  const only = (values: ArrayLike<number>) =>
    Float64Array.from(values, (value, i) => (high[i] > low[i] ? value : Number.NaN));
  const [lows, highs] = [traceSeries(only(low), stack, view, rowPx), traceSeries(only(high), stack, view, rowPx)];
  const runs: RangeRun[] = [];
  const add = (least: number, most: number, bottom: number, top: number) => {
    const run = runs[runs.length - 1];
    if (run && Math.abs(run[run.length - 1] - bottom) < 1e-6) run.push(least, most, bottom, top);
    else runs.push([least, most, bottom, top]);
  };
  if (lows.kind === "rows" && highs.kind === "rows") {
    for (let n = 0; n < lows.triples.length; n += 3) {
      add(lows.triples[n + 1], highs.triples[n + 2], lows.triples[n] + rowPx, lows.triples[n]);
    }
  }
  if (lows.kind === "steps" && highs.kind === "steps") {
    for (let n = 0; n < lows.pairs.length; n += 4) {
      if (!Number.isNaN(lows.pairs[n])) add(lows.pairs[n], highs.pairs[n], lows.pairs[n + 1], lows.pairs[n + 3]);
    }
  }
  return runs;
}
