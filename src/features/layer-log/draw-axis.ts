import { heightMarks, layerMarks } from "#src/features/layer-log/axis-marks.ts";
import { hairline, LOG_FONT, label, sharp } from "#src/features/layer-log/draw-kit.ts";
import { yOf } from "#src/features/layer-log/height-view.ts";
import { type LogPicture, SCALE_STRIP_PX } from "#src/features/layer-log/log-picture.ts";

/** Right edges of the two columns of numbers within the axis. */
export const MM_RIGHT = 48;
export const LAYER_RIGHT = 90;
const EXTENT_X = 5;

/** Height in mm, layer numbers, and which part of the whole is in view. */
export function drawAxis(context: CanvasRenderingContext2D, picture: LogPicture): void {
  const { stack, view, palette, ratio, layout } = picture;
  context.font = LOG_FONT;
  context.fillStyle = palette.soft;
  label(context, "mm", MM_RIGHT, SCALE_STRIP_PX / 2, "right");
  label(context, "layer", LAYER_RIGHT, SCALE_STRIP_PX / 2, "right");
  const end = layout.marks.x;
  for (const { y, text } of heightMarks(stack, view)) {
    hairline(context, ratio, palette.hair, [layout.axis.width, y, end, y]);
    hairline(context, ratio, palette.rule, [MM_RIGHT + 3, y, MM_RIGHT + 8, y]);
    context.fillStyle = palette.ink;
    label(context, text, MM_RIGHT, y, "right");
  }
  context.fillStyle = palette.soft;
  for (const { y, text } of layerMarks(stack, view)) {
    label(context, text, LAYER_RIGHT, y, "right");
    hairline(context, ratio, palette.rule, [LAYER_RIGHT + 3, y, layout.axis.width, y]);
  }
  hairline(context, ratio, palette.rule, [layout.axis.width, SCALE_STRIP_PX, layout.axis.width, view.bottomPx]);
  drawObjects(context, picture);
  drawExtent(context, picture);
}

/** Objects printed one after the other: a double line where the next one begins on the bed. */
function drawObjects(context: CanvasRenderingContext2D, { stack, view, palette, ratio, layout }: LogPicture): void {
  for (const { baseMm } of stack.objects.slice(1)) {
    if (baseMm <= view.fromMm || baseMm >= view.toMm) continue;
    const y = yOf(view, baseMm);
    for (const shift of [-1.5, 1.5]) {
      hairline(context, ratio, palette.rule, [MM_RIGHT - 40, y + shift, layout.marks.x, y + shift]);
    }
  }
}

/** A rule as long as the whole part, thick where it is in view. */
function drawExtent(context: CanvasRenderingContext2D, { stack, view, palette, ratio }: LogPicture): void {
  const { topPx, bottomPx, fromMm, toMm } = view;
  if (fromMm <= 0 && toMm >= stack.totalMm) return;
  const at = (mm: number) => bottomPx - (mm / stack.totalMm) * (bottomPx - topPx);
  hairline(context, ratio, palette.rule, [EXTENT_X, topPx, EXTENT_X, bottomPx]);
  context.fillStyle = palette.ink;
  context.fillRect(sharp(EXTENT_X, ratio) - 1.5, at(toMm), 3, Math.max(at(fromMm) - at(toMm), 3));
}
