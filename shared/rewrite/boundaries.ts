import type { Boundary, ControlLine, PauseLine, Reading } from "#shared/layers/reading.ts";

/** All line boundaries of the window at which a command may stand, ascending: layer starts, travels, both sides of pauses. */
export class Boundaries {
  readonly list: readonly Boundary[];

  private readonly going: ReadonlyMap<number, ControlLine>;

  /** @param going lines that the tuning may take out */
  constructor(reading: Reading, going: readonly ControlLine[]) {
    const { travels, layers, window, pauses } = reading;
    this.going = new Map(going.map((line) => [line.offset, line]));
    const list: Boundary[] = layers.map(({ writeAt }) => writeAt);
    for (const pause of pauses)
      list.push({ offset: pause.offset, line: pause.line, timeS: pause.timeS }, this.behind(pause));
    for (let k = 0; k < travels.count; k++)
      list.push({ offset: travels.offset[k], line: travels.line[k], timeS: travels.timeS[k] });
    list.sort((a, b) => a.offset - b.offset);
    this.list = list.filter(
      ({ offset }, k) => offset >= window.start.offset && offset < window.end.offset && offset !== list[k - 1]?.offset,
    );
  }

  /**
   * The boundary behind a pause and behind the lines after it that go: what stands next, a layer's start for one, is at
   * the same boundary whether or not the file was tuned before.
   */
  behind({ offset, length, line, timeS }: PauseLine): Boundary {
    let end = offset + length;
    let next = line + 1;
    for (let gone = this.going.get(end); gone; gone = this.going.get(end)) {
      end += gone.length;
      next++;
    }
    return { offset: end, line: next, timeS };
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
    return this.count((boundary) => boundary.offset < offset);
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
const TOLERANCE_S = 1e-6;
