import { hairline, LOG_FONT, label, strokes } from "#src/features/layer-log/draw-kit.ts";
import { drawWindows } from "#src/features/layer-log/draw-windows.ts";
import type { Column } from "#src/features/layer-log/log-layout.ts";
import { type LogPicture, SCALE_STRIP_PX } from "#src/features/layer-log/log-picture.ts";
import type { Palette } from "#src/features/layer-log/palette.ts";
import { rangeRuns } from "#src/features/layer-log/range-runs.ts";
import { eachRun, traceSeries } from "#src/features/layer-log/trace.ts";
import type { Tone, Track, TrackSeries } from "#src/features/layer-log/track.ts";
import { marksOf, type Scale, shareOf } from "#src/lib/scale.ts";

const DASHES: Record<TrackSeries["style"]["line"], number[]> = { solid: [], dashed: [5, 3], dotted: [2, 2] };

export function toneColour(tone: Tone, palette: Palette): string {
  return tone === "bone" ? palette.boneEdge : tone === "amber" ? palette.amberInk : palette[tone];
}

export function drawTrack(context: CanvasRenderingContext2D, picture: LogPicture, i: number): void {
  const [track, scale, column] = [picture.tracks[i], picture.scales[i], picture.layout.tracks[i]];
  drawScale(context, picture, track, scale, column);
  context.save();
  context.beginPath();
  context.rect(column.x, picture.view.topPx - 1, column.width, picture.view.bottomPx - picture.view.topPx + 2);
  context.clip();
  const xOf = (value: number) => column.x + shareOf(scale, value) * column.width;
  drawWindows(context, picture, track.windows ?? [], xOf, column);
  for (const series of track.series) drawRange(context, picture, series, xOf);
  for (const series of track.series) drawSeries(context, picture, series, xOf, column);
  if (track.pale) veil(context, picture, column);
  context.restore();
}

/** What is drawn so far steps back, and stays readable. */
function veil(context: CanvasRenderingContext2D, { palette, view }: LogPicture, { x, width }: Column): void {
  context.globalAlpha = 0.55;
  context.fillStyle = palette.sheet;
  context.fillRect(x + 1, view.topPx - 1, width - 2, view.bottomPx - view.topPx + 2);
  context.globalAlpha = 1;
}

/** Frame, marks with their numbers above, and the lines of reference. */
function drawScale(
  context: CanvasRenderingContext2D,
  { palette, ratio, view }: LogPicture,
  track: Track,
  scale: Scale,
  { x, width }: Column,
): void {
  const marks = marksOf(scale, Math.floor(width / 44));
  context.font = LOG_FONT;
  context.fillStyle = palette.soft;
  let free = x - 6;
  for (const { value, text } of marks) {
    const at = x + shareOf(scale, value) * width;
    hairline(context, ratio, palette.hair, [at, SCALE_STRIP_PX, at, view.bottomPx]);
    const half = context.measureText(text).width / 2;
    const middle = Math.min(Math.max(at, x + half), x + width - half);
    if (middle - half < free + 6) continue;
    label(context, text, middle, SCALE_STRIP_PX / 2, "center");
    free = middle + half;
  }
  if (scale.kind === "log") drawLogTicks(context, ratio, palette.rule, scale, { x, width });
  for (const edge of [x, x + width])
    hairline(context, ratio, palette.rule, [edge, SCALE_STRIP_PX, edge, view.bottomPx]);
  let [before, row] = [Number.NEGATIVE_INFINITY, 0];
  for (const { value, label: name } of track.references ?? []) {
    const at = x + shareOf(scale, value) * width;
    hairline(context, ratio, palette.ink, [at, SCALE_STRIP_PX, at, view.bottomPx]);
    context.fillStyle = palette.ink;
    const from = Math.min(at + 3, x + width - context.measureText(name).width);
    // A name that would run into the one before stands under it.
    row = from < before + 4 ? row + 1 : 0;
    label(context, name, from, view.topPx + 8 + 12 * row);
    before = from + context.measureText(name).width;
  }
}

/** Short ticks at 2 to 9 in every decade, which tell a logarithmic scale from a linear one at a glance. */
function drawLogTicks(
  context: CanvasRenderingContext2D,
  ratio: number,
  colour: string,
  scale: Scale,
  { x, width }: Column,
): void {
  for (let decade = scale.from; decade < scale.to; decade *= 10) {
    for (let factor = 2; factor <= 9 && factor * decade < scale.to; factor++) {
      const at = x + shareOf(scale, factor * decade) * width;
      hairline(context, ratio, colour, [at, SCALE_STRIP_PX, at, SCALE_STRIP_PX + 4]);
    }
  }
}

/** The hatched or tinted strip between a series' low and high. */
function drawRange(
  context: CanvasRenderingContext2D,
  { stack, view, ratio, palette, patterns }: LogPicture,
  { low, high, style, uncertain }: TrackSeries,
  xOf: (value: number) => number,
): void {
  if (!low || !high) return;
  context.beginPath();
  for (const run of rangeRuns(low, high, stack, view, 1 / ratio)) {
    context.moveTo(xOf(run[0]), run[2]);
    for (let n = 0; n < run.length; n += 4) {
      for (const edge of [run[n + 2], run[n + 3]]) context.lineTo(xOf(run[n]), edge);
    }
    for (let n = run.length - 4; n >= 0; n -= 4) {
      for (const edge of [run[n + 3], run[n + 2]]) context.lineTo(xOf(run[n + 1]), edge);
    }
    context.closePath();
  }
  const colour = toneColour(style.tone, palette);
  // What is uncertain is a tint: it lies on the hatches of the states.
  context.globalAlpha = uncertain ? 0.16 : 1;
  context.fillStyle = uncertain ? colour : patterns.hatch(colour);
  context.fill();
  // A raise of one layer only is too low for a hatch to show.
  context.globalAlpha = 0.6;
  context.strokeStyle = colour;
  context.lineWidth = 1 / ratio;
  context.stroke();
  context.globalAlpha = 1;
}

function drawSeries(
  context: CanvasRenderingContext2D,
  picture: LogPicture,
  { values, style }: TrackSeries,
  xOf: (value: number) => number,
  column: Column,
): void {
  const { stack, view, ratio, palette, patterns } = picture;
  const trace = traceSeries(values, stack, view, 1 / ratio);
  const colour = toneColour(style.tone, palette);
  if (style.fill) {
    context.globalAlpha = style.fill === "wash" ? 0.13 : 1;
    context.fillStyle = style.fill === "wash" ? colour : patterns.hatch(colour);
    if (trace.kind === "rows") {
      eachRun(trace, (y, height, least) => context.fillRect(column.x, y, xOf(least) - column.x, height));
    } else {
      context.beginPath();
      area(context, trace.pairs, xOf, column.x);
      context.fill();
    }
    context.globalAlpha = 1;
  }
  const widthPx = { solid: 1.5, dashed: 1.25, dotted: 2 }[style.line];
  if (trace.kind === "rows") drawRows(context, trace, style.line, colour, widthPx, xOf);
  else {
    context.beginPath();
    strokes(context, trace.pairs, xOf);
    context.strokeStyle = colour;
    context.lineWidth = widthPx;
    context.lineJoin = "miter";
    context.setLineDash(DASHES[style.line]);
    context.stroke();
    context.setLineDash([]);
  }
}

/** Rows of pixels instead of a stroke: as many rectangles as rows, whatever the number of layers. */
function drawRows(
  context: CanvasRenderingContext2D,
  trace: { triples: Float64Array; rowPx: number },
  line: TrackSeries["style"]["line"],
  colour: string,
  widthPx: number,
  xOf: (value: number) => number,
): void {
  context.fillStyle = colour;
  const [dash, gap] = DASHES[line].length > 0 ? DASHES[line] : [1, 0];
  const period = dash + gap;
  eachRun(trace, (y, height, least, most) => {
    const [x, width] = [xOf(least) - widthPx / 2, xOf(most) - xOf(least) + widthPx];
    // A wide row is a step of the line: it is never left out.
    if (gap === 0 || width > 5) {
      context.fillRect(x, y, width, height);
      return;
    }
    for (let from = Math.floor(y / period) * period; from < y + height; from += period) {
      const [top, end] = [Math.max(from, y), Math.min(from + dash, y + height)];
      if (end > top) context.fillRect(x, top, width, end - top);
    }
  });
}

/** The area between the track's left edge and the staircase, piece by piece. */
function area(context: CanvasPath, pairs: Float64Array, xOf: (value: number) => number, left: number): void {
  let lastY = Number.NaN;
  for (let n = 0; n < pairs.length; n += 2) {
    const x = xOf(pairs[n]);
    if (Number.isNaN(x)) {
      if (!Number.isNaN(lastY)) context.lineTo(left, lastY);
      lastY = Number.NaN;
      continue;
    }
    if (Number.isNaN(lastY)) context.moveTo(left, pairs[n + 1]);
    context.lineTo(x, pairs[n + 1]);
    lastY = pairs[n + 1];
  }
  if (!Number.isNaN(lastY)) context.lineTo(left, lastY);
}
