import type { Column } from "#shared/thermal/column.ts";

/** Two neighbours become one where the nearer end lies this many times their common size away, counted in layers. */
const DISTANCE_PER_SIZE = 3;
/** And only while they are about as warm as each other: at the border of two zones, layers stay apart for longer, K. */
const MOST_DIFFERENCE_C = 2;
/** Unlike neighbours wait for each other, so that each layer is merged a number of times that grows with log(layers). */
const LARGEST_RATIO = 2;

/**
 * Merges neighbouring nodes deep inside a column, in one pass. Nothing is dropped: heat, crystals and areas are kept.
 *
 * @param tell is called for a node before it is merged, while its layers can still be told apart from its neighbour's
 */
export function coarsen(column: Column, tell: (node: number) => void): void {
  const { layers } = column;
  let above = 0;
  for (let i = 0; i < column.count; i++) above += layers[i];
  let below = 0;
  for (let i = 0; i + 1 < column.count; i++) {
    const size = layers[i] + layers[i + 1];
    const distance = Math.min(below, above - below - size);
    const alike = Math.max(layers[i], layers[i + 1]) <= LARGEST_RATIO * Math.min(layers[i], layers[i + 1]);
    const close = Math.abs(column.tempC[i] - column.tempC[i + 1]) <= MOST_DIFFERENCE_C;
    if (alike && close && size * DISTANCE_PER_SIZE <= distance) {
      tell(i);
      tell(i + 1);
      column.merge(i);
    }
    below += layers[i];
  }
}
