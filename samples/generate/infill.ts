import { type Contour, distanceMm, outline, type Point } from "#samples/generate/contour.ts";

/** A straight bead. */
export interface Stroke {
  from: Point;
  to: Point;
}

interface Clip {
  /** even-odd: outer contours and the holes in them */
  keep: readonly Contour[];
  /** areas left out because something else fills them */
  without?: readonly Contour[];
}

type Interval = [number, number];

/** Strokes shorter than this are left out, mm. */
const SHORTEST_MM = 0.4;

/**
 * Parallel strokes over a region. The contours are turned so that the strokes lie along x; lines stand at the same
 * places in every layer, and each is cut where it crosses the contours.
 *
 * @param angleDeg direction of the strokes, from the x axis
 * @param pitchMm distance between neighbouring strokes, mm
 */
export function hatch(angleDeg: number, pitchMm: number, { keep, without = [] }: Clip): Stroke[] {
  const angle = (angleDeg * Math.PI) / 180;
  const turned = (contours: readonly Contour[]) => contours.map((contour) => outline(contour).map(turn(-angle)));
  const kept = turned(keep);
  const left = turned(without);
  const heights = kept.flat().map((point) => point.y);
  const back = turn(angle);
  const strokes: Stroke[] = [];
  for (let row = Math.ceil(Math.min(...heights) / pitchMm); (row + 0.5) * pitchMm < Math.max(...heights); row++) {
    const y = (row + 0.5) * pitchMm;
    for (const [start, end] of subtract(inside(kept, y), inside(left, y))) {
      if (end - start < SHORTEST_MM) continue;
      strokes.push({ from: back({ x: start, y }), to: back({ x: end, y }) });
    }
  }
  return strokes;
}

/** Reorders and turns strokes so that each begins at the free end nearest to where the one before stopped. */
export function nearestFirst(strokes: readonly Stroke[], start: Point): Stroke[] {
  const waiting = [...strokes];
  const ordered: Stroke[] = [];
  let here = start;
  while (waiting.length > 0) {
    let best = 0;
    let bestMm = Number.POSITIVE_INFINITY;
    for (let index = 0; index < waiting.length; index++) {
      const stroke = waiting[index];
      const reachMm = Math.min(distanceMm(here, stroke.from), distanceMm(here, stroke.to));
      if (reachMm < bestMm - 1e-9) [best, bestMm] = [index, reachMm];
    }
    const [next] = waiting.splice(best, 1);
    const ahead = distanceMm(here, next.from) <= distanceMm(here, next.to);
    ordered.push(ahead ? next : { from: next.to, to: next.from });
    here = ordered.at(-1)!.to;
  }
  return ordered;
}

const turn =
  (angle: number) =>
  ({ x, y }: Point): Point => ({
    x: x * Math.cos(angle) - y * Math.sin(angle),
    y: x * Math.sin(angle) + y * Math.cos(angle),
  });

/** Where the line at height y runs inside the polygons, even-odd. */
function inside(polygons: readonly Point[][], y: number): Interval[] {
  const crossings: number[] = [];
  for (const polygon of polygons) {
    polygon.forEach((b, index) => {
      const a = polygon.at(index - 1)!;
      if (a.y <= y !== b.y <= y) crossings.push(a.x + ((y - a.y) / (b.y - a.y)) * (b.x - a.x));
    });
  }
  crossings.sort((a, b) => a - b);
  return Array.from({ length: crossings.length / 2 }, (_, pair) => [crossings[2 * pair], crossings[2 * pair + 1]]);
}

function subtract(intervals: Interval[], holes: readonly Interval[]): Interval[] {
  return holes.reduce(
    (rest, [from, to]) =>
      rest.flatMap(([start, end]): Interval[] => [
        ...(start < from ? [[start, Math.min(end, from)] as Interval] : []),
        ...(end > to ? [[Math.max(start, to), end] as Interval] : []),
      ]),
    intervals,
  );
}
