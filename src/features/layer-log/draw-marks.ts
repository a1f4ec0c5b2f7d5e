import { fitting, hairline, label } from "#src/features/layer-log/draw-kit.ts";
import { yOf } from "#src/features/layer-log/height-view.ts";
import { positionOfIndex } from "#src/features/layer-log/layer-stack.ts";
import type { LogPicture } from "#src/features/layer-log/log-picture.ts";
import { STATE_NAMES } from "#src/lib/state-fill.ts";

const MARK_APART_PX = 10;

/** Findings and advice at their height: a filled wedge for a warning, an open one for anything else. */
export function drawMarks(context: CanvasRenderingContext2D, picture: LogPicture): void {
  const { marks, stack, view, palette, layout } = picture;
  const rows = new Map<number, boolean>();
  for (const { layer, severity } of marks) {
    const i = positionOfIndex(stack, layer);
    if (i < 0 || stack.topMm[i] <= view.fromMm || stack.bottomMm[i] >= view.toMm) continue;
    const y = yOf(view, (stack.bottomMm[i] + stack.topMm[i]) / 2);
    // Where marks would cover each other, one stands for them.
    const row = Math.round(y / MARK_APART_PX) * MARK_APART_PX;
    rows.set(row, rows.get(row) || severity === "warning");
  }
  const x = layout.marks.x + 4;
  context.lineWidth = 1;
  for (const [y, warning] of rows) {
    context.beginPath();
    context.moveTo(x, y);
    context.lineTo(x + 8, y - 4.5);
    context.lineTo(x + 8, y + 4.5);
    context.closePath();
    context.fillStyle = warning ? palette.ink : palette.sheet;
    context.strokeStyle = palette.ink;
    context.fill();
    context.stroke();
  }
}

/** The profile's zones as a column of bands with their names, and where duties run over from one to the next. */
export function drawBands(context: CanvasRenderingContext2D, picture: LogPicture): void {
  const { bands, layout, view, palette, patterns, ratio } = picture;
  if (!layout.aside || !picture.bandColumn) return;
  const { x, width } = layout.aside;
  const strip = 14;
  for (const { fromMm, toMm, target, name, rampMm } of bands) {
    const [top, bottom] = [Math.max(yOf(view, toMm), view.topPx), Math.min(yOf(view, fromMm), view.bottomPx)];
    if (bottom <= top) continue;
    context.fillStyle = patterns.state[target];
    context.fillRect(x, top, strip, bottom - top);
    context.strokeStyle = palette.rule;
    context.lineWidth = 1 / ratio;
    context.strokeRect(x, top, strip, bottom - top);
    for (const y of [top, bottom]) hairline(context, ratio, palette.rule, [x, y, x + width, y]);
    drawRamp(context, picture, x + strip + 4, fromMm, Math.min(fromMm + rampMm, toMm));
    context.font = `12px ${getComputedStyle(context.canvas).fontFamily}`;
    const room = width - strip - 18;
    const ramp = rampMm > 0 ? [`ramp ${rampMm} mm`] : [];
    const lines = [name, STATE_NAMES[target].toLowerCase(), ...ramp].slice(0, Math.floor((bottom - top) / 16));
    lines.forEach((text, n) => {
      context.fillStyle = n === 0 ? palette.ink : palette.soft;
      label(
        context,
        fitting(context, text, room),
        x + strip + 12,
        (top + bottom) / 2 + (n - (lines.length - 1) / 2) * 14,
      );
    });
  }
}

function drawRamp(
  context: CanvasRenderingContext2D,
  picture: LogPicture,
  x: number,
  fromMm: number,
  toMm: number,
): void {
  const { view, palette } = picture;
  if (toMm <= fromMm || toMm <= view.fromMm || fromMm >= view.toMm) return;
  const [bottom, top] = [yOf(view, Math.max(fromMm, view.fromMm)), yOf(view, Math.min(toMm, view.toMm))];
  context.beginPath();
  context.moveTo(x, bottom);
  context.lineTo(x + 4, top);
  context.strokeStyle = palette.ink;
  context.lineWidth = 1;
  context.stroke();
}
