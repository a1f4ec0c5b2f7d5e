import type { Reading } from "#shared/layers/reading.ts";

/** Print times of the line boundaries that a reading knows, by byte. */
export class KnownTimes {
  private readonly reading: Reading;

  constructor(reading: Reading) {
    this.reading = reading;
  }

  /** Print time of a boundary between two bytes, both included; NaN when the reading knows none there, s. */
  within(from: number, to: number): number {
    const { layers, travels, controls, pauses, window } = this.reading;
    const among = (count: number, offset: (k: number) => number, timeS: (k: number) => number): number => {
      const k = firstFrom(count, offset, from);
      return k < count && offset(k) <= to ? timeS(k) : Number.NaN;
    };
    const candidates = [
      () =>
        among(
          layers.length,
          (k) => layers[k].writeAt.offset,
          (k) => layers[k].writeAt.timeS,
        ),
      () =>
        among(
          travels.count,
          (k) => travels.offset[k],
          (k) => travels.timeS[k],
        ),
      () =>
        among(
          1,
          () => window.end.offset,
          () => window.end.timeS,
        ),
      () =>
        among(
          pauses.length,
          (k) => pauses[k].offset,
          (k) => pauses[k].timeS,
        ),
      () =>
        among(
          pauses.length,
          (k) => pauses[k].offset + pauses[k].length,
          (k) => pauses[k].timeS,
        ),
      () =>
        among(
          controls.length,
          (k) => controls[k].offset,
          (k) => controls[k].timeS,
        ),
      () =>
        among(
          controls.length,
          (k) => controls[k].offset + controls[k].length,
          (k) => controls[k].timeS,
        ),
    ];
    for (const timeS of candidates) {
      const found = timeS();
      if (!Number.isNaN(found)) return found;
    }
    return Number.NaN;
  }
}

/** First of `count` ascending values that is at least `value`. */
export function firstFrom(count: number, at: (k: number) => number, value: number): number {
  let low = 0;
  let high = count;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (at(middle) < value) low = middle + 1;
    else high = middle;
  }
  return low;
}
