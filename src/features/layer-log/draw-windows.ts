import { yOf } from "#src/features/layer-log/height-view.ts";
import type { Column } from "#src/features/layer-log/log-layout.ts";
import type { LogPicture } from "#src/features/layer-log/log-picture.ts";
import type { TrackWindow } from "#src/features/layer-log/track.ts";

/** Where values are meant to lie: the state's fill, thinned so that lines read on it, and its edge as a line. */
export function drawWindows(
  context: CanvasRenderingContext2D,
  { stack, view, palette, patterns }: LogPicture,
  windows: readonly TrackWindow[],
  xOf: (value: number) => number,
  column: Column,
): void {
  for (const { state, low, high, runs } of windows) {
    const left = Number.isFinite(low) ? xOf(low) : column.x;
    const right = Number.isFinite(high) ? xOf(high) : column.x + column.width;
    context.fillStyle = patterns.state[state];
    context.strokeStyle = state === "amorphous" ? palette.amberInk : palette.boneEdge;
    context.lineWidth = 1;
    context.beginPath();
    for (const [first, last] of runs) {
      const top = Math.max(yOf(view, stack.topMm[last]), view.topPx);
      const bottom = Math.min(yOf(view, stack.bottomMm[first]), view.bottomPx);
      if (bottom <= top) continue;
      context.globalAlpha = 0.45;
      context.fillRect(left, top, right - left, bottom - top);
      for (const [end, x] of [
        [low, left],
        [high, right],
      ]) {
        if (!Number.isFinite(end)) continue;
        context.moveTo(x, bottom);
        context.lineTo(x, top);
      }
    }
    context.globalAlpha = 1;
    context.stroke();
  }
}
