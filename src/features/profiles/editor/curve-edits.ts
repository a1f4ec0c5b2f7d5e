import type { CurveOver, CurvePoint } from "#shared/formats/profile.ts";

/** Changes of a curve's points. They stay sorted: a point moves no further than its neighbours. */

export interface CurveGrid {
  /** least distance of two points, and what x is rounded to */
  x: number;
  /** what a duty is rounded to */
  duty: number;
}

export const CURVE_GRIDS: Record<CurveOver, CurveGrid> = {
  "layer-time": { x: 0.1, duty: 0.01 },
  "deposited-length": { x: 1, duty: 0.01 },
  height: { x: 0.1, duty: 0.01 },
};

export const OVER_NAMES: Record<CurveOver, { name: string; unit: string }> = {
  "layer-time": { name: "layer time", unit: "s" },
  "deposited-length": { name: "deposited length", unit: "mm" },
  height: { name: "height", unit: "mm" },
};

/** A point moved towards a wanted place, kept between its neighbours and between 0 and 1. */
export function movedPoint(
  points: readonly CurvePoint[],
  i: number,
  wanted: CurvePoint,
  grid: CurveGrid,
): CurvePoint[] {
  const lowest = i === 0 ? 0 : points[i - 1][0] + grid.x;
  const highest = i === points.length - 1 ? Number.POSITIVE_INFINITY : points[i + 1][0] - grid.x;
  const x = Math.min(Math.max(onGrid(wanted[0], grid.x), lowest), Math.max(highest, lowest));
  const duty = Math.min(Math.max(onGrid(wanted[1], grid.duty), 0), 1);
  return points.map((point, n) => (n === i ? [clean(x), duty] : point));
}

/** A new point where one has pointed, sorted in; where a point stands already, nothing. */
export function pointAdded(points: readonly CurvePoint[], at: CurvePoint, grid: CurveGrid): CurvePoint[] {
  const x = Math.max(onGrid(at[0], grid.x), 0);
  if (points.some(([other]) => Math.abs(other - x) < grid.x / 2)) return [...points];
  const added: CurvePoint = [x, Math.min(Math.max(onGrid(at[1], grid.duty), 0), 1)];
  return [...points, added].sort(([a], [b]) => a - b);
}

/** A new point after point `i`: half way to the next one, or as far beyond the last as that lies from the one before. */
export function pointAfter(points: readonly CurvePoint[], i: number, grid: CurveGrid): CurvePoint[] {
  if (points.length === 0) return [[0, 0]];
  const here = points[i];
  const next = points[i + 1];
  if (next) {
    const middle: CurvePoint = [(here[0] + next[0]) / 2, (here[1] + next[1]) / 2];
    return pointAdded(points, middle, grid);
  }
  const reach = i > 0 ? here[0] - points[i - 1][0] : Math.max(here[0], 10 * grid.x);
  return [...points, [clean(here[0] + Math.max(reach, grid.x)), here[1]]];
}

/** A curve keeps at least one point. */
export function pointRemoved(points: readonly CurvePoint[], i: number): CurvePoint[] {
  return points.length < 2 ? [...points] : points.filter((_, n) => n !== i);
}

/** The same duties over another quantity: points spread over its range in the same proportions. */
export function overRange(
  points: readonly CurvePoint[],
  [from, to]: readonly [number, number],
  grid: CurveGrid,
): CurvePoint[] {
  const first = points[0]?.[0] ?? 0;
  const span = (points[points.length - 1]?.[0] ?? 1) - first || 1;
  let least = 0;
  return points.map(([x, duty]) => {
    const spread = Math.max(onGrid(from + ((x - first) / span) * (to - from), grid.x), least);
    least = clean(spread + grid.x);
    return [spread, duty];
  });
}

/** Piecewise linear, flat outside; the points sorted. */
export function curveDuty(points: readonly CurvePoint[], x: number): number {
  const above = points.findIndex(([at]) => at >= x);
  if (above < 0) return points[points.length - 1][1];
  if (above === 0) return points[0][1];
  const [[x0, d0], [x1, d1]] = [points[above - 1], points[above]];
  return d0 + ((d1 - d0) * (x - x0)) / (x1 - x0);
}

function onGrid(value: number, step: number): number {
  return clean(Math.round(value / step) * step);
}

/** Takes the dust of binary fractions off. */
function clean(value: number): number {
  return Number(value.toFixed(6));
}
