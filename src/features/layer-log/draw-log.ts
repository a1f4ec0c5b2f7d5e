import { drawAxis } from "#src/features/layer-log/draw-axis.ts";
import { drawBands, drawMarks } from "#src/features/layer-log/draw-marks.ts";
import { drawPointer } from "#src/features/layer-log/draw-pointer.ts";
import { drawSilhouette } from "#src/features/layer-log/draw-silhouette.ts";
import { drawTrack } from "#src/features/layer-log/draw-track.ts";
import type { LogPicture, LogPointer } from "#src/features/layer-log/log-picture.ts";

/** Draws everything that stands still. */
export function drawLog(context: CanvasRenderingContext2D, picture: LogPicture, heightPx: number): void {
  clear(context, picture, heightPx);
  drawAxis(context, picture);
  drawSilhouette(context, picture);
  for (let i = 0; i < picture.tracks.length; i++) drawTrack(context, picture, i);
  drawMarks(context, picture);
  drawBands(context, picture);
}

/** Draws what moves, on a canvas of its own above the other. */
export function drawLogPointer(
  context: CanvasRenderingContext2D,
  picture: LogPicture,
  heightPx: number,
  pointer: LogPointer,
): void {
  clear(context, picture, heightPx);
  drawPointer(context, picture, pointer);
}

function clear(context: CanvasRenderingContext2D, { layout, ratio }: LogPicture, heightPx: number): void {
  context.setTransform(ratio, 0, 0, ratio, 0, 0);
  context.clearRect(0, 0, layout.width, heightPx);
}
