/** Small things every part of the log draws with. */

export const LOG_FONT = '11px "JetBrains Mono", ui-monospace, monospace';
export const LOG_FONT_STRONG = '600 11px "JetBrains Mono", ui-monospace, monospace';

/** A coordinate at which a line of one device pixel is sharp. */
export function sharp(at: number, ratio: number): number {
  return (Math.round(at * ratio - 0.5) + 0.5) / ratio;
}

/** A hairline of one device pixel, or of one px on coarse screens, which is the same. */
export function hairline(
  context: CanvasRenderingContext2D,
  ratio: number,
  colour: string,
  ends: readonly [number, number, number, number],
): void {
  const [x1, y1, x2, y2] = ends;
  context.strokeStyle = colour;
  context.lineWidth = 1 / ratio;
  context.beginPath();
  context.moveTo(x1 === x2 ? sharp(x1, ratio) : x1, y1 === y2 ? sharp(y1, ratio) : y1);
  context.lineTo(x1 === x2 ? sharp(x2, ratio) : x2, y1 === y2 ? sharp(y2, ratio) : y2);
  context.stroke();
}

export function label(
  context: CanvasRenderingContext2D,
  text: string,
  x: number,
  y: number,
  align: CanvasTextAlign = "left",
): void {
  context.textAlign = align;
  context.textBaseline = "middle";
  context.fillText(text, x, y);
}

/** As much of a text as fits, with an ellipsis where something is left out; empty where not even that fits. */
export function fitting(context: CanvasRenderingContext2D, text: string, widthPx: number): string {
  if (context.measureText(text).width <= widthPx) return text;
  for (let end = text.length - 1; end > 1; end--) {
    const short = `${text.slice(0, end).trimEnd()}…`;
    if (context.measureText(short).width <= widthPx) return short;
  }
  return "";
}

/** A staircase as a line; a gap starts a new stroke. */
export function strokes(context: CanvasPath, pairs: Float64Array, xOf: (value: number) => number): void {
  let down = false;
  for (let n = 0; n < pairs.length; n += 2) {
    const x = xOf(pairs[n]);
    if (Number.isNaN(x)) {
      down = false;
      continue;
    }
    if (down) context.lineTo(x, pairs[n + 1]);
    else context.moveTo(x, pairs[n + 1]);
    down = true;
  }
}
