import { type HeightView, yOf } from "#src/features/layer-log/height-view.ts";
import { type LayerStack, positionAtHeight } from "#src/features/layer-log/layer-stack.ts";

/**
 * A series made ready to be drawn, from the bottom up.
 *
 * `steps`: a layer's value holds over its whole height, so with room enough the line is a staircase: pairs of value and
 * pixel row. A pair of NaN ends a stroke.
 *
 * `rows`: where layers are about as thin as pixels, every row of pixels carries the least and greatest value of the
 * layers that it crosses: triples of the row's upper edge, least and greatest. What is drawn covers the same pixels as
 * the full line, and its cost grows with pixels, not with layers.
 */
export type Trace = { kind: "steps"; pairs: Float64Array } | { kind: "rows"; rowPx: number; triples: Float64Array };

/** Positions of the layers that a view shows, [first, last]. */
export function shownPositions(stack: LayerStack, { fromMm, toMm }: HeightView): [number, number] {
  if (stack.count === 0) return [0, -1];
  const first = positionAtHeight(stack, fromMm);
  const last = positionAtHeight(stack, toMm);
  // A layer covers (bottom, top]: one that only touches the lower edge is not seen.
  return [fromMm >= stack.topMm[first] && first < last ? first + 1 : first, last];
}

/** @param rowPx height of a pixel row, in the view's pixels: 1 over the device's pixel ratio */
export function traceSeries(values: ArrayLike<number>, stack: LayerStack, view: HeightView, rowPx = 1): Trace {
  const [first, last] = shownPositions(stack, view);
  const rows = (view.bottomPx - view.topPx) / rowPx;
  return last - first + 1 > rows / 3
    ? { kind: "rows", rowPx, triples: traceRows(values, stack, view, rowPx) }
    : { kind: "steps", pairs: traceSteps(values, stack, view) };
}

export function traceSteps(values: ArrayLike<number>, stack: LayerStack, view: HeightView): Float64Array {
  const [first, last] = shownPositions(stack, view);
  const pairs = new Float64Array(4 * Math.max(last - first + 1, 0));
  let n = 0;
  for (let i = first; i <= last; i++) {
    const value = values[i];
    const known = !Number.isNaN(value);
    pairs[n++] = value;
    pairs[n++] = known ? yOf(view, Math.max(stack.bottomMm[i], view.fromMm)) : Number.NaN;
    pairs[n++] = value;
    pairs[n++] = known ? yOf(view, Math.min(stack.topMm[i], view.toMm)) : Number.NaN;
  }
  return pairs;
}

export function traceRows(values: ArrayLike<number>, stack: LayerStack, view: HeightView, rowPx: number): Float64Array {
  const { count, topMm } = stack;
  const rows = Math.round((view.bottomPx - view.topPx) / rowPx);
  const mmPerRow = (view.toMm - view.fromMm) / rows;
  const triples = new Float64Array(3 * rows);
  let [i] = shownPositions(stack, view);
  // A step at the very border of two rows is drawn in the upper one, so the line has no gap there.
  let before = Number.NaN;
  let n = 0;
  for (let row = 0; row < rows && i < count; row++) {
    const rowTopMm = view.fromMm + (row + 1) * mmPerRow;
    let least = before;
    let most = before;
    for (; ; i++) {
      const value = values[i];
      before = value;
      if (!Number.isNaN(value)) {
        // Comparisons with NaN are false, so the first value is taken as it is.
        if (!(least <= value)) least = value;
        if (!(most >= value)) most = value;
      }
      // The layer that reaches beyond this row, or just to its edge, is the last of it.
      if (topMm[i] >= rowTopMm - 1e-9 || i === count - 1) break;
    }
    if (topMm[i] <= rowTopMm + 1e-9) i++;
    if (Number.isNaN(least)) continue;
    triples[n++] = view.bottomPx - (row + 1) * rowPx;
    triples[n++] = least;
    triples[n++] = most;
  }
  return triples.subarray(0, n);
}

/** Calls back for every run of rows that show the same, as one rectangle: upper edge, height, least, greatest. */
export function eachRun(
  { triples, rowPx }: { triples: Float64Array; rowPx: number },
  run: (y: number, height: number, least: number, most: number) => void,
): void {
  for (let n = 0; n < triples.length; ) {
    const [bottom, least, most] = [triples[n] + rowPx, triples[n + 1], triples[n + 2]];
    let top = triples[n];
    n += 3;
    while (
      n < triples.length &&
      triples[n + 1] === least &&
      triples[n + 2] === most &&
      top - triples[n] < 1.5 * rowPx
    ) {
      top = triples[n];
      n += 3;
    }
    run(top, bottom - top, least, most);
  }
}
