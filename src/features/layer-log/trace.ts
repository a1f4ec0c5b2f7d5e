import { type HeightView, yOf } from "#src/features/layer-log/height-view.ts";
import { type LayerStack, positionAtHeight } from "#src/features/layer-log/layer-stack.ts";

/**
 * A series as a line, from the bottom up: pairs of value and pixel row. A pair of NaN ends a stroke.
 *
 * A layer's value holds over its whole height, so with room enough the line is a staircase. Where several layers share
 * a pixel row, first, least, greatest and last of their values stand for them, in the order in which they occur: the
 * line then covers the same pixels as the full one, with four points a row at most.
 */
export type Trace = Float64Array;

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
  return last - first + 1 > rows / 2
    ? traceRows(values, stack, view, first, last, rowPx)
    : traceSteps(values, stack, view, first, last);
}

function traceSteps(
  values: ArrayLike<number>,
  stack: LayerStack,
  view: HeightView,
  first: number,
  last: number,
): Trace {
  const trace = new Float64Array(4 * Math.max(last - first + 1, 0));
  let n = 0;
  for (let i = first; i <= last; i++) {
    const value = values[i];
    const known = !Number.isNaN(value);
    trace[n++] = value;
    trace[n++] = known ? yOf(view, Math.max(stack.bottomMm[i], view.fromMm)) : Number.NaN;
    trace[n++] = value;
    trace[n++] = known ? yOf(view, Math.min(stack.topMm[i], view.toMm)) : Number.NaN;
  }
  return trace.subarray(0, n);
}

function traceRows(
  values: ArrayLike<number>,
  stack: LayerStack,
  view: HeightView,
  first: number,
  last: number,
  rowPx: number,
): Trace {
  const pxPerMm = (view.bottomPx - view.topPx) / (view.toMm - view.fromMm);
  const rowOf = (i: number) => Math.floor(((stack.topMm[i] - view.fromMm) * pxPerMm) / rowPx);
  const trace = new Float64Array(2 * 5 * (Math.ceil((view.bottomPx - view.topPx) / rowPx) + 2));
  let n = 0;
  let i = first;
  while (i <= last) {
    const row = rowOf(i);
    const begin = i;
    let least = -1;
    let most = -1;
    let end = -1;
    let start = -1;
    let gap = false;
    for (; i <= last && (i === begin || rowOf(i) === row); i++) {
      const value = values[i];
      if (Number.isNaN(value)) {
        gap = true;
        continue;
      }
      if (start < 0) start = i;
      if (least < 0 || value < values[least]) least = i;
      if (most < 0 || value > values[most]) most = i;
      end = i;
    }
    const y = Math.max(view.bottomPx - (row + 0.5) * rowPx, view.topPx);
    if (gap && n > 0) {
      trace[n++] = Number.NaN;
      trace[n++] = Number.NaN;
    }
    if (start < 0) continue;
    const [one, other] = least < most ? [least, most] : [most, least];
    let before = -1;
    for (const position of [start, one, other, end]) {
      if (position === before) continue;
      before = position;
      trace[n++] = values[position];
      trace[n++] = y;
    }
  }
  return trace.subarray(0, n);
}
