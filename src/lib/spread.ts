/** A stretch of pixels. */
export interface Stretch {
  top: number;
  height: number;
}

/**
 * Heights for things that lie one upon the other, so that each is at least so high: what the low ones take, the high ones
 * give. Where there is no room for all, all are alike.
 *
 * @param heights from the top down, px
 */
export function atLeast(heights: readonly number[], leastPx: number): number[] {
  const total = heights.reduce((sum, height) => sum + height, 0);
  if (heights.length * leastPx >= total) return heights.map(() => total / heights.length);
  const spare = heights.reduce((sum, height) => sum + Math.max(height - leastPx, 0), 0);
  const lacking = heights.reduce((sum, height) => sum + Math.max(leastPx - height, 0), 0);
  return heights.map((height) => Math.max(leastPx, height) - (Math.max(height - leastPx, 0) * lacking) / spare);
}

/**
 * Places that lie at least so far apart, each moved no further from where it belongs than its neighbours make it.
 *
 * @param ys ascending, px
 */
export function apart(ys: readonly number[], leastPx: number, [low, high]: readonly [number, number]): number[] {
  const down = [...ys];
  for (let i = 1; i < down.length; i++) down[i] = Math.max(down[i], down[i - 1] + leastPx);
  // What was pushed over the end comes back, and pushes those before it.
  for (let i = down.length - 1, limit = high; i >= 0; i--, limit = down[i + 1] - leastPx)
    down[i] = Math.min(down[i], limit);
  return down.map((y, i) => Math.max(y, low + i * leastPx));
}
