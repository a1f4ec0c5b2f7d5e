/** What the silhouette needs to know of a layer. */
export interface SectionLayer {
  boxMm: { min: readonly number[]; max: readonly number[] };
  areaMm2: number;
}

/**
 * The part seen from the side: how far each layer reaches, and how much of that is open.
 *
 *     ▐█▌ ▐█▌   A layer is as wide as its box and filled from both sides in proportion to its plan area, so that
 *     ▐█▌ ▐█▌   a ring or a thin-walled dome looks hollow and a plate solid. It is a picture to find one's way by,
 *     ▐█████▌   not a section at one place.
 */
export interface Section {
  /** lowest and highest coordinate of each layer, mm */
  left: Float64Array;
  right: Float64Array;
  /** share of the width that is open in the middle, 0-1 */
  open: Float64Array;
  /** over all layers, mm */
  fromMm: number;
  toMm: number;
  /** the axis one looks along is the other one */
  across: "X" | "Y";
}

/** Share of its box that a round solid covers: below it, something is open. */
const ROUND = Math.PI / 4;

/** Walls are never drawn so thin that their fill can't be told. */
const MOST_OPEN = 0.84;

export function sectionOf(layers: readonly SectionLayer[]): Section {
  const [x, y] = [reach(layers, 0), reach(layers, 1)];
  // The side that shows more of the part's form is the one whose width changes more, else the wider one.
  const axis = y.change > x.change * 1.05 || (y.change >= x.change && y.to - y.from > x.to - x.from) ? 1 : 0;
  const { from, to } = axis === 0 ? x : y;
  return {
    left: Float64Array.from(layers, ({ boxMm }) => boxMm.min[axis]),
    right: Float64Array.from(layers, ({ boxMm }) => boxMm.max[axis]),
    open: Float64Array.from(layers, openShare),
    fromMm: from,
    toMm: to > from ? to : from + 1,
    across: axis === 0 ? "X" : "Y",
  };
}

function openShare({ boxMm: { min, max }, areaMm2 }: SectionLayer): number {
  const box = (max[0] - min[0]) * (max[1] - min[1]);
  if (!(box > 0)) return 0;
  const filled = areaMm2 / (box * ROUND);
  return filled >= 0.9 ? 0 : Math.min(Math.sqrt(1 - Math.max(filled, 0)), MOST_OPEN);
}

function reach(layers: readonly SectionLayer[], axis: 0 | 1) {
  let from = Number.POSITIVE_INFINITY;
  let to = Number.NEGATIVE_INFINITY;
  let narrowest = Number.POSITIVE_INFINITY;
  for (const { boxMm } of layers) {
    from = Math.min(from, boxMm.min[axis]);
    to = Math.max(to, boxMm.max[axis]);
    narrowest = Math.min(narrowest, boxMm.max[axis] - boxMm.min[axis]);
  }
  return layers.length === 0
    ? { from: 0, to: 1, change: 0 }
    : { from, to, change: (to - from) / Math.max(narrowest, 1) };
}
