import type { Boundary, Reading } from "#shared/layers/reading.ts";

/** All line boundaries of the window at which a command may stand, ascending: layer starts, travels, both sides of pauses. */
export class Boundaries {
  readonly list: readonly Boundary[];

  constructor(reading: Reading) {
    const { travels, layers, window, pauses } = reading;
    const list: Boundary[] = layers.map(({ writeAt }) => writeAt);
    for (const { offset, length, line, timeS } of pauses)
      list.push({ offset, line, timeS }, { offset: offset + length, line: line + 1, timeS });
    for (let k = 0; k < travels.count; k++)
      list.push({ offset: travels.offset[k], line: travels.line[k], timeS: travels.timeS[k] });
    list.sort((a, b) => a.offset - b.offset);
    this.list = list.filter(
      ({ offset }, k) => offset >= window.start.offset && offset < window.end.offset && offset !== list[k - 1]?.offset,
    );
  }

  /** Position in `list` of the last boundary at or before an instant; 0 when there is none. */
  lastBefore(timeS: number): number {
    const { list } = this;
    let low = 0;
    let high = list.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (list[middle].timeS <= timeS + TOLERANCE_S) low = middle + 1;
      else high = middle;
    }
    return Math.max(low - 1, 0);
  }

  /** Position in `list` of the first boundary at or after an instant and after a position; list.length when there is none. */
  firstFrom(timeS: number, after: number): number {
    let k = after + 1;
    while (k < this.list.length && this.list[k].timeS < timeS - TOLERANCE_S) k++;
    return k;
  }

  /** Position of the boundary at exactly this byte. */
  at(offset: number): number {
    let low = 0;
    let high = this.list.length - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (this.list[middle].offset < offset) low = middle + 1;
      else high = middle;
    }
    return low;
  }
}

/** Print time is a sum of floating-point durations; instants this close are one, s. */
const TOLERANCE_S = 1e-6;
