import { fitting, hairline, LOG_FONT, label, strokes } from "#src/features/layer-log/draw-kit.ts";
import { yOf } from "#src/features/layer-log/height-view.ts";
import { type LogPicture, SCALE_STRIP_PX } from "#src/features/layer-log/log-picture.ts";
import { shownPositions, traceRows, traceSteps } from "#src/features/layer-log/trace.ts";
import { fixedText } from "#src/lib/number-text.ts";
import type { PredictedState } from "#src/lib/state-fill.ts";

/** The part from the side, filled with the states it is predicted to have, or else is meant to be in. */
export function drawSilhouette(context: CanvasRenderingContext2D, picture: LogPicture): void {
  const { layout, section, palette } = picture;
  const { x, width } = layout.silhouette;
  const inset = 8;
  const scale = (width - 2 * inset) / (section.toMm - section.fromMm);
  const xOf = (mm: number) => x + inset + (mm - section.fromMm) * scale;
  const trace = outlineTracer(picture);
  const sides = [trace(section.left, "least"), trace(section.right, "most")];
  const walls = wallTraces(picture, trace);

  const body = new Path2D();
  ring(body, sides, xOf);
  for (const wall of walls) ring(body, wall, xOf);
  context.save();
  context.clip(body, "evenodd");
  if (picture.states) fillPredicted(context, picture, picture.states);
  else fillTargets(context, picture);
  context.restore();

  context.strokeStyle = palette.ink;
  context.lineWidth = 1;
  for (const side of [...sides, ...walls.flat()]) {
    context.beginPath();
    strokes(context, side, xOf);
    context.stroke();
  }
  drawTop(context, picture, xOf);
  drawWidth(context, picture, xOf);
}

type Outline = (values: ArrayLike<number>, side: "least" | "most") => Float64Array;

/** Pairs of coordinate and pixel row: a staircase, or one pair a row where layers are as thin as pixels. */
function outlineTracer({ stack, view, ratio }: LogPicture): Outline {
  const [first, last] = shownPositions(stack, view);
  if (last - first + 1 <= view.bottomPx - view.topPx) return (values) => traceSteps(values, stack, view);
  return (values, side) => {
    const triples = traceRows(values, stack, view, 1 / ratio);
    const pairs = new Float64Array((triples.length / 3) * 2);
    for (let n = 0, m = 0; n < triples.length; n += 3) {
      pairs[m++] = triples[n + (side === "least" ? 1 : 2)];
      pairs[m++] = triples[n] + 0.5 / ratio;
    }
    return pairs;
  };
}

/** The inner walls, a pair for every run of layers that are open in the middle. */
function wallTraces({ section, stack }: LogPicture, trace: Outline): Float64Array[][] {
  if (!section.open.some((share) => share > 0)) return [];
  const wall = (side: -1 | 1) => {
    const values = new Float64Array(stack.count);
    for (let i = 0; i < stack.count; i++) {
      const [left, right, open] = [section.left[i], section.right[i], section.open[i]];
      values[i] = open > 0 ? (left + right + side * open * (right - left)) / 2 : Number.NaN;
    }
    return pieces(trace(values, side < 0 ? "most" : "least"));
  };
  const [left, right] = [wall(-1), wall(1)];
  return left.map((piece, i) => [piece, right[i] ?? piece]);
}

/** A missing row or two is a gap; a staircase's own rises keep their value. */
const JUMP_PX = 1.6;

/** Runs without a gap: a missing value, or, where rows without one are left out, a jump in height. */
function pieces(trace: Float64Array): Float64Array[] {
  const found: Float64Array[] = [];
  let from = -1;
  for (let n = 0; n <= trace.length; n += 2) {
    const end = n === trace.length || Number.isNaN(trace[n]);
    const jump = !end && from >= 0 && n > from && trace[n - 1] - trace[n + 1] > JUMP_PX && trace[n] !== trace[n - 2];
    if (from >= 0 && (end || jump)) {
      found.push(trace.subarray(from, n));
      from = -1;
    }
    if (!end && from < 0) from = n;
  }
  return found;
}

/** Up along one side and down along the other. */
function ring(path: Path2D, [up, down]: readonly Float64Array[], xOf: (mm: number) => number): void {
  for (let n = 0; n < up.length; n += 2) {
    if (n === 0) path.moveTo(xOf(up[n]), up[n + 1]);
    else path.lineTo(xOf(up[n]), up[n + 1]);
  }
  for (let n = down.length - 2; n >= 0; n -= 2) path.lineTo(xOf(down[n]), down[n + 1]);
  path.closePath();
}

/** Layers of one state in a row are one rectangle: a hatch then runs through them, and thin layers cost nothing. */
function fillPredicted(
  context: CanvasRenderingContext2D,
  { layout, patterns, stack, view }: LogPicture,
  states: readonly PredictedState[],
): void {
  const { x, width } = layout.silhouette;
  const [first, last] = shownPositions(stack, view);
  for (let from = first; from <= last; ) {
    let to = from;
    while (to < last && states[to + 1] === states[from]) to++;
    // States that change within a row of pixels can't be told apart: the row has that of its first layer.
    while (to < last && yOf(view, stack.bottomMm[from]) - yOf(view, stack.topMm[to]) < 1) to++;
    const [top, bottom] = [
      Math.max(yOf(view, stack.topMm[to]), view.topPx),
      Math.min(yOf(view, stack.bottomMm[from]), view.bottomPx),
    ];
    context.fillStyle = patterns.state[states[from]];
    context.fillRect(x, top, width, bottom - top);
    from = to + 1;
  }
}

function fillTargets(context: CanvasRenderingContext2D, { bands, layout, palette, patterns, view }: LogPicture): void {
  const { x, width } = layout.silhouette;
  if (bands.length === 0) {
    context.globalAlpha = 0.16;
    context.fillStyle = palette.ink;
    context.fillRect(x, view.topPx, width, view.bottomPx - view.topPx);
    context.globalAlpha = 1;
  }
  for (const { fromMm, toMm, target } of bands) {
    const [top, bottom] = [Math.max(yOf(view, toMm), view.topPx), Math.min(yOf(view, fromMm), view.bottomPx)];
    if (bottom <= top) continue;
    context.fillStyle = patterns.state[target];
    context.fillRect(x, top, width, bottom - top);
  }
}

/** Where the part ends, above and below, and where one object ends and the next begins. */
function drawTop(context: CanvasRenderingContext2D, picture: LogPicture, xOf: (mm: number) => number): void {
  const { stack, section, view, palette, ratio, layout } = picture;
  for (const { object, baseMm, topMm, first, last } of stack.objects) {
    if (topMm <= view.toMm) {
      const y = yOf(view, topMm);
      hairline(context, ratio, palette.ink, [xOf(section.left[last]), y, xOf(section.right[last]), y]);
    }
    if (baseMm < view.fromMm || baseMm > view.toMm) continue;
    const y = yOf(view, baseMm);
    hairline(context, ratio, palette.ink, [xOf(section.left[first]), y, xOf(section.right[first]), y]);
    if (stack.objects.length === 1) continue;
    context.font = LOG_FONT;
    context.fillStyle = palette.soft;
    const middle = layout.silhouette.x + layout.silhouette.width / 2;
    label(context, fitting(context, `object ${object}`, layout.silhouette.width), middle, y - 10, "center");
  }
}

/** How wide the part is at its widest, above the silhouette. */
function drawWidth(context: CanvasRenderingContext2D, picture: LogPicture, xOf: (mm: number) => number): void {
  const { section, palette, ratio } = picture;
  const [left, right, y] = [xOf(section.fromMm), xOf(section.toMm), SCALE_STRIP_PX / 2];
  context.font = LOG_FONT;
  context.fillStyle = palette.soft;
  const text = `${section.across} ${fixedText(section.toMm - section.fromMm, 1)} mm`;
  const half = context.measureText(text).width / 2 + 4;
  const middle = (left + right) / 2;
  label(context, text, middle, y, "center");
  for (const [from, to] of [
    [left, middle - half],
    [middle + half, right],
  ]) {
    if (to > from) hairline(context, ratio, palette.rule, [from, y, to, y]);
  }
  for (const end of [left, right]) hairline(context, ratio, palette.rule, [end, y - 4, end, y + 4]);
}
