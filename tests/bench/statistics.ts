/** Middle value; of an even number the lower one. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[(sorted.length - 1) >> 1];
}

/** The given jobs, each `rounds` times, in an order shuffled afresh every round: absolute times drift, ratios within a round do not. */
export function shuffledRounds<T>(jobs: readonly T[], rounds: number): T[] {
  const order: T[] = [];
  for (let round = 0; round < rounds; round++) {
    const rest = [...jobs];
    while (rest.length > 0) order.push(...rest.splice(Math.floor(Math.random() * rest.length), 1));
  }
  return order;
}

/** Milliseconds that a piece of work takes. */
export function milliseconds(work: () => void): number {
  const start = performance.now();
  work();
  return performance.now() - start;
}
