import type { Boundary, ControlLine, Reading } from "#shared/layers/reading.ts";

/** All line boundaries of the window at which a command may stand, ascending: layer starts, travels, both sides of pauses. */
export class Boundaries {
  readonly list: readonly Boundary[];

  /**
   * Byte behind a pause by the byte behind the lines that follow it and may go: without those the two are one
   * boundary, and so they are one here. The file then has the same boundaries before and after it was tuned.
   */
  private readonly behindPause = new Map<number, number>();

  /** @param removable lines that the tuning may take out */
  constructor({ travels, layers, window, pauses }: Reading, removable: readonly ControlLine[]) {
    const lengthAt = new Map(removable.map(({ offset, length }) => [offset, length]));
    const list: Boundary[] = layers.map(({ writeAt }) => writeAt);
    for (const { offset, length, line, timeS } of pauses) {
      const behind = offset + length;
      let next = behind;
      while (lengthAt.has(next)) next += lengthAt.get(next)!;
      this.behindPause.set(next, behind);
      list.push({ offset, line, timeS }, { offset: behind, line: line + 1, timeS });
    }
    for (let k = 0; k < travels.count; k++)
      list.push({ offset: travels.offset[k], line: travels.line[k], timeS: travels.timeS[k] });
    this.list = list
      .filter(
        ({ offset }) => offset >= window.start.offset && offset < window.end.offset && this.one(offset) === offset,
      )
      .sort((a, b) => a.offset - b.offset)
      .filter(({ offset }, k, sorted) => offset !== sorted[k - 1]?.offset);
  }

  private one(offset: number): number {
    return this.behindPause.get(offset) ?? offset;
  }

  /** Position in `list` of the last boundary at or before an instant; 0 when there is none. */
  lastBefore(timeS: number): number {
    return Math.max(this.count((boundary) => boundary.timeS <= timeS + TOLERANCE_S) - 1, 0);
  }

  /** Position in `list` of the first boundary at or after an instant and after a position; list.length when there is none. */
  firstFrom(timeS: number, after: number): number {
    return Math.max(
      this.count((boundary) => boundary.timeS < timeS - TOLERANCE_S),
      after + 1,
    );
  }

  /** Position in `list` of the first boundary at or after a byte; list.length when there is none. */
  at(offset: number): number {
    const one = this.one(offset);
    return this.count((boundary) => boundary.offset < one);
  }

  /** How many boundaries, from the first on, something holds for. */
  private count(holds: (boundary: Boundary) => boolean): number {
    let low = 0;
    let high = this.list.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (holds(this.list[middle])) low = middle + 1;
      else high = middle;
    }
    return low;
  }
}

/** Print time is a sum of floating-point durations; instants this close are one, s. */
export const TOLERANCE_S = 1e-6;
