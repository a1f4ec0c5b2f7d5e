/** What the layer log needs to know of a layer, as a reading has it. */
export interface StackedLayer {
  /** 1-based, ascending */
  index: number;
  object: number;
  zMm: number;
  heightMm: number;
}

/**
 * The layers' places on one height axis. Objects printed one after the other start on the bed again; on the axis each
 * stands upon the one before, in print order, so that every height belongs to one layer.
 *
 *     axis   objects
 *      9 ┬  ┌───┐       each layer covers (bottom, top] on the axis;
 *        │  │ 2 │ 3 mm  its own height above the bed is top - base
 *      6 ┼──┴───┴── base of object 2
 *        │  │ 1 │ 6 mm
 *      0 ┴──┴───┴── base of object 1
 */
export interface LayerStack {
  count: number;
  /** index of each layer, as the reading counts */
  index: Int32Array;
  bottomMm: Float64Array;
  topMm: Float64Array;
  totalMm: number;
  objects: StackedObject[];
}

export interface StackedObject {
  object: number;
  baseMm: number;
  topMm: number;
  /** positions in print order, from 0 */
  first: number;
  last: number;
}

/** The least thickness a layer is given where its height says nothing, mm. */
const LEAST_MM = 1e-3;

/** @param layers in print order */
export function stackLayers(layers: readonly StackedLayer[]): LayerStack {
  const count = layers.length;
  const stack: LayerStack = {
    count,
    index: Int32Array.from(layers, ({ index }) => index),
    bottomMm: new Float64Array(count),
    topMm: new Float64Array(count),
    totalMm: 0,
    objects: [],
  };
  let current: StackedObject | undefined;
  for (let i = 0; i < count; i++) {
    const { object, zMm } = layers[i];
    if (current === undefined || object !== current.object) {
      current = { object, baseMm: stack.totalMm, topMm: stack.totalMm, first: i, last: i };
      stack.objects.push(current);
    }
    const bottom = current.topMm;
    const top = Math.max(current.baseMm + (Number.isFinite(zMm) ? zMm : 0), bottom + LEAST_MM);
    stack.bottomMm[i] = bottom;
    stack.topMm[i] = top;
    current.topMm = top;
    current.last = i;
    stack.totalMm = top;
  }
  return stack;
}

/** Position of the layer that covers a height on the axis; the lowest or highest one outside. -1 without layers. */
export function positionAtHeight({ count, topMm }: LayerStack, atMm: number): number {
  let low = 0;
  let high = count - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (atMm <= topMm[middle]) high = middle;
    else low = middle + 1;
  }
  return high;
}

/** Position of the layer with an index, or -1. */
export function positionOfIndex({ count, index }: LayerStack, wanted: number): number {
  let low = 0;
  let high = count - 1;
  while (low <= high) {
    const middle = (low + high) >> 1;
    if (index[middle] === wanted) return middle;
    if (index[middle] < wanted) low = middle + 1;
    else high = middle - 1;
  }
  return -1;
}

/** The object that holds a position. */
export function objectAt({ objects }: LayerStack, position: number): StackedObject {
  return objects.find(({ last }) => position <= last) ?? objects[objects.length - 1];
}
