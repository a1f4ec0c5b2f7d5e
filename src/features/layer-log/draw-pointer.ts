import { LAYER_RIGHT, MM_RIGHT } from "#src/features/layer-log/draw-axis.ts";
import { LOG_FONT, LOG_FONT_STRONG, label, sharp } from "#src/features/layer-log/draw-kit.ts";
import { toneColour } from "#src/features/layer-log/draw-track.ts";
import { yOf } from "#src/features/layer-log/height-view.ts";
import { objectAt } from "#src/features/layer-log/layer-stack.ts";
import type { LogPicture, LogPointer } from "#src/features/layer-log/log-picture.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { shareOf } from "#src/lib/scale.ts";

/** Crosshair, pinned layer and the band that is being dragged: all that changes while the log itself stands still. */
export function drawPointer(context: CanvasRenderingContext2D, picture: LogPicture, pointer: LogPointer): void {
  const { pinned, hovered, band } = pointer;
  if (band) drawBand(context, picture, band.fromMm, band.toMm);
  if (pinned >= 0) drawLayerLine(context, picture, pinned, true);
  if (hovered >= 0 && hovered !== pinned) drawLayerLine(context, picture, hovered, false);
}

function drawBand(context: CanvasRenderingContext2D, picture: LogPicture, fromMm: number, toMm: number): void {
  const { layout, view, palette, ratio } = picture;
  const [top, bottom] = [yOf(view, Math.max(fromMm, toMm)), yOf(view, Math.min(fromMm, toMm))];
  context.fillStyle = palette.ink;
  context.globalAlpha = 0.14;
  context.fillRect(layout.axis.width, top, layout.marks.x - layout.axis.width, bottom - top);
  context.globalAlpha = 1;
  context.strokeStyle = palette.ink;
  context.lineWidth = 1;
  context.beginPath();
  for (const y of [top, bottom]) {
    context.moveTo(layout.axis.width, sharp(y, ratio));
    context.lineTo(layout.marks.x, sharp(y, ratio));
  }
  context.stroke();
}

function drawLayerLine(context: CanvasRenderingContext2D, picture: LogPicture, i: number, pinned: boolean): void {
  const { stack, view, layout, palette, ratio } = picture;
  if (stack.topMm[i] <= view.fromMm || stack.bottomMm[i] >= view.toMm) return;
  const [top, bottom] = [yOf(view, stack.topMm[i]), yOf(view, stack.bottomMm[i])];
  const [from, to] = [layout.axis.width, layout.marks.x];
  const middle = (top + bottom) / 2;
  context.save();
  context.beginPath();
  context.rect(0, view.topPx - 8, layout.width, view.bottomPx - view.topPx + 16);
  context.clip();
  if (bottom - top > 3) {
    context.fillStyle = palette.ink;
    context.globalAlpha = pinned ? 0.13 : 0.07;
    context.fillRect(from, top, to - from, bottom - top);
    context.globalAlpha = 1;
  }
  context.strokeStyle = palette.ink;
  context.lineWidth = 1;
  context.setLineDash(pinned ? [] : [2, 2]);
  context.beginPath();
  context.moveTo(MM_RIGHT + 3, sharp(middle, ratio));
  context.lineTo(to, sharp(middle, ratio));
  context.stroke();
  context.setLineDash([]);
  drawValues(context, picture, i, middle);
  drawNumbers(context, picture, i, middle, pinned);
  context.restore();
}

/** A small square on every line at the layer. */
function drawValues(context: CanvasRenderingContext2D, picture: LogPicture, i: number, y: number): void {
  const { tracks, scales, layout, palette } = picture;
  tracks.forEach((track, t) => {
    const { x, width } = layout.tracks[t];
    for (const { values, style } of track.series) {
      const at = x + Math.min(Math.max(shareOf(scales[t], values[i]), 0), 1) * width;
      if (Number.isNaN(at)) continue;
      context.fillStyle = style.line === "solid" ? toneColour(style.tone, palette) : palette.sheet;
      context.strokeStyle = toneColour(style.tone, palette);
      context.fillRect(at - 2.5, y - 2.5, 5, 5);
      context.strokeRect(at - 2.5, y - 2.5, 5, 5);
    }
  });
}

/** Height and number of the layer, in place of what the axis has there. */
function drawNumbers(
  context: CanvasRenderingContext2D,
  picture: LogPicture,
  i: number,
  y: number,
  pinned: boolean,
): void {
  const { stack, palette } = picture;
  context.font = pinned ? LOG_FONT_STRONG : LOG_FONT;
  const heightMm = stack.topMm[i] - objectAt(stack, i).baseMm;
  for (const [right, text] of [
    [MM_RIGHT, fixedText(heightMm, 2)],
    [LAYER_RIGHT, String(stack.index[i])],
  ] as const) {
    const width = context.measureText(text).width;
    context.fillStyle = palette.sheet;
    context.fillRect(right - Math.max(width, 30) - 2, y - 9, Math.max(width, 30) + 4, 18);
    context.fillStyle = palette.ink;
    label(context, text, right, y, "right");
  }
}
