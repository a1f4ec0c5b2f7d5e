/**
 * Collects the reasons for one duty after the other. It is emptied and filled again rather than made anew: a list that
 * grows by itself reserves far more room than two or three reasons need, tens of thousands of times in a plan.
 */
export class Reasons {
  private readonly steps: string[] = [];
  private count = 0;

  add(reason: string): void {
    this.steps[this.count++] = reason;
  }

  /** What was added since it was last taken, in that order. */
  take(): string[] {
    const taken = this.steps.slice(0, this.count);
    this.count = 0;
    return taken;
  }
}

/** A reason for each of the whole numbers 0 to `last`, e.g. the steps of a drive; each is put together once. */
export function reasonTable(last: number, reason: (n: number) => string): (n: number) => string {
  const made: (string | undefined)[] = new Array(last + 1).fill(undefined);
  return (n) => {
    made[n] ??= reason(n);
    return made[n];
  };
}
