import type { CurvePoint } from "#shared/formats/profile.ts";
import type { CurveGrid } from "#src/features/profiles/editor/curve-edits.ts";
import type { Scale } from "#src/lib/scale.ts";

/** Size of the plot and room for its numbers, in its own units. */
export const PLOT = { width: 380, height: 188, left: 34, bottom: 40, top: 10, right: 12 };

/** The next place of a point for an arrow key. */
export function steppedPoint(
  [x, duty]: CurvePoint,
  key: string,
  times: number,
  stepX: number,
  stepDuty: number,
): CurvePoint | undefined {
  switch (key) {
    case "ArrowLeft":
      return [x - times * stepX, duty];
    case "ArrowRight":
      return [x + times * stepX, duty];
    case "ArrowUp":
      return [x, duty + times * stepDuty];
    case "ArrowDown":
      return [x, duty - times * stepDuty];
    default:
      return undefined;
  }
}

/** One press moves a point by about a two-hundredth of what is shown. */
export function stepX(scale: Scale, grid: CurveGrid): number {
  return Math.max(grid.x, Math.round((scale.to - scale.from) / 200 / grid.x) * grid.x);
}

/**
 * Room for the points and for most of the layers, but not for one layer that is very long. A curve over height has the
 * zone's heights, with some room around them.
 */
export function quantityScale(
  points: readonly CurvePoint[],
  rug?: ArrayLike<number>,
  within?: readonly [number, number],
): Scale {
  const xs = points.map(([x]) => x).filter(Number.isFinite);
  if (within && within[1] > within[0]) {
    const [from, to] = [Math.min(...xs, within[0]), Math.max(...xs, within[1])];
    const room = (to - from) * 0.06;
    return { kind: "linear", from: Math.max(from - room, 0), to: to + room };
  }
  const last = Math.max(...xs, 0) || 1;
  let most = 0;
  for (let i = 0; rug && i < rug.length; i++) most = Math.max(most, rug[i]);
  return { kind: "linear", from: 0, to: Math.max(last * 1.15, Math.min(most * 1.05, last * 2)) };
}

/** Flat to the first point and after the last one, as the plan reads it. */
export function curvePath(
  points: readonly CurvePoint[],
  scale: Scale,
  xOf: (x: number) => number,
  yOf: (duty: number) => number,
): string {
  const usable = points.filter(([x, duty]) => Number.isFinite(x) && Number.isFinite(duty));
  if (usable.length === 0) return `M ${xOf(scale.from)} ${yOf(0)}`;
  const ends: CurvePoint[] = [[scale.from, usable[0][1]], ...usable, [scale.to, usable[usable.length - 1][1]]];
  return ends
    .map(
      ([x, duty], i) => `${i === 0 ? "M" : "L"} ${xOf(x).toFixed(1)} ${yOf(Math.min(Math.max(duty, 0), 1)).toFixed(1)}`,
    )
    .join(" ");
}
