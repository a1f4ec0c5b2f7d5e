import { strokes } from "#src/features/layer-log/draw-kit.ts";
import type { LogPicture } from "#src/features/layer-log/log-picture.ts";
import { rangeRuns } from "#src/features/layer-log/range-runs.ts";
import { traceSeries } from "#src/features/layer-log/trace.ts";
import type { TrackWindow } from "#src/features/layer-log/track.ts";

/** Where values are meant to lie: the state's fill, thinned so that lines read on it, and its edge as a line. */
export function drawWindows(
  context: CanvasRenderingContext2D,
  picture: LogPicture,
  windows: readonly TrackWindow[],
  xOf: (value: number) => number,
): void {
  const { stack, view, ratio, palette, patterns } = picture;
  for (const { state, low, high, edge } of windows) {
    context.globalAlpha = 0.45;
    context.fillStyle = patterns.state[state];
    for (const run of rangeRuns(low, high, stack, view, 1 / ratio)) {
      for (let n = 0; n < run.length; n += 4) {
        const [left, right, bottom, top] = [xOf(run[n]), xOf(run[n + 1]), run[n + 2], run[n + 3]];
        context.fillRect(left, top, right - left, bottom - top);
      }
    }
    context.globalAlpha = 1;
    drawEdge(
      context,
      traceOf(edge === "low" ? low : high),
      xOf,
      state === "amorphous" ? palette.amberInk : palette.boneEdge,
    );
  }

  function traceOf(values: ArrayLike<number>): Float64Array {
    const trace = traceSeries(values, stack, view, 1 / ratio);
    if (trace.kind === "steps") return trace.pairs;
    const pairs = new Float64Array((trace.triples.length / 3) * 2);
    for (let n = 0, m = 0; n < trace.triples.length; n += 3) {
      pairs[m++] = trace.triples[n + 1];
      pairs[m++] = trace.triples[n];
    }
    return pairs;
  }
}

function drawEdge(
  context: CanvasRenderingContext2D,
  pairs: Float64Array,
  xOf: (value: number) => number,
  colour: string,
): void {
  context.beginPath();
  strokes(context, pairs, xOf);
  context.strokeStyle = colour;
  context.lineWidth = 1;
  context.setLineDash([]);
  context.stroke();
}
