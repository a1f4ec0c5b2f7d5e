/** Values at the crossings of a grid: rows of `x.length` values, one row for every `y`. */
export interface Grid {
  x: readonly number[];
  y: readonly number[];
  values: ArrayLike<number>;
}

export type Point = readonly [x: number, y: number];

/**
 * Each cell is cut along a diagonal into two triangles, over which the value is linear, so that lines and areas meet from
 * cell to cell without a gap, and none is ambiguous as it can be in a square.
 */
function* triangles({ x, y, values }: Grid): Generator<[Vertex, Vertex, Vertex]> {
  const at = (i: number, j: number): Vertex => ({ point: [x[i], y[j]], value: values[j * x.length + i] });
  for (let j = 0; j + 1 < y.length; j++) {
    for (let i = 0; i + 1 < x.length; i++) {
      const [a, b, c, d] = [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)];
      yield [a, b, c];
      yield [a, c, d];
    }
  }
}

interface Vertex {
  point: Point;
  value: number;
}

/** The line along which the value is `level`, as separate pieces. */
export function isoLine(grid: Grid, level: number): [Point, Point][] {
  const pieces: [Point, Point][] = [];
  for (const corners of triangles(grid)) {
    const ends: Point[] = [];
    for (let k = 0; k < 3; k++) {
      const [from, to] = [corners[k], corners[(k + 1) % 3]];
      // One side of the level includes it, so that a corner that lies exactly on it counts once.
      if (from.value < level !== to.value < level) ends.push(crossing(from, to, level));
    }
    if (ends.length === 2 && !same(ends[0], ends[1])) pieces.push([ends[0], ends[1]]);
  }
  return pieces;
}

/** The area in which the value lies within [low, high], as polygons; either end may be infinite. */
export function areaWithin(grid: Grid, low: number, high: number): Point[][] {
  const polygons: Point[][] = [];
  for (const corners of triangles(grid)) {
    const cut = clipped(clipped(corners, low, 1), high, -1);
    if (cut.length > 2) polygons.push(cut.map(({ point }) => point));
  }
  return polygons;
}

/** What of a polygon lies where `side * value >= side * level`. */
function clipped(corners: readonly Vertex[], level: number, side: 1 | -1): Vertex[] {
  if (!Number.isFinite(level)) return side * level < 0 ? [...corners] : [];
  const inside = ({ value }: Vertex) => side * value >= side * level;
  return corners.flatMap((from, k) => {
    const to = corners[(k + 1) % corners.length];
    const kept = inside(from) ? [from] : [];
    return inside(from) === inside(to) ? kept : [...kept, { point: crossing(from, to, level), value: level }];
  });
}

function crossing(from: Vertex, to: Vertex, level: number): Point {
  const share = (level - from.value) / (to.value - from.value);
  return [from.point[0] + (to.point[0] - from.point[0]) * share, from.point[1] + (to.point[1] - from.point[1]) * share];
}

const same = ([ax, ay]: Point, [bx, by]: Point): boolean => ax === bx && ay === by;

/** The value at any place within the grid. */
export function valueWithin({ x, y, values }: Grid, [px, py]: Point): number {
  const [i, u] = cellOf(x, px);
  const [j, v] = cellOf(y, py);
  const at = (di: number, dj: number) => values[(j + dj) * x.length + i + di];
  return (at(0, 0) * (1 - u) + at(1, 0) * u) * (1 - v) + (at(0, 1) * (1 - u) + at(1, 1) * u) * v;
}

/** The cell that holds a coordinate, and how far along it lies, 0-1. */
function cellOf(along: readonly number[], at: number): [cell: number, share: number] {
  let i = 0;
  while (i + 2 < along.length && at > along[i + 1]) i++;
  const share = (at - along[i]) / (along[i + 1] - along[i]);
  return [i, Math.min(Math.max(share, 0), 1)];
}
