import type { Channel } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { resolveLeadS } from "#shared/plan/lead.ts";
import type { Comparison } from "#shared/prove/comparison.ts";
import { firstFrom } from "#shared/prove/known-times.ts";

/** Instants this close are one, s. */
const SAME_S = 1e-6;

/** The line boundaries inside the window at which a planned duty may be written: layer starts, travels, around pauses. */
export class Instants {
  /** ascending */
  readonly offset: readonly number[];
  readonly timeS: readonly number[];

  private readonly reading: Reading;
  private readonly gaps: Comparison["gaps"];

  /** @param gaps what was taken out: boundaries with nothing else between them are one */
  constructor(reading: Reading, gaps: Comparison["gaps"]) {
    this.reading = reading;
    this.gaps = gaps;
    const { travels, layers, pauses, window } = reading;
    const places: [number, number][] = layers.map(({ writeAt }) => [writeAt.offset, writeAt.timeS]);
    for (const { offset, length, timeS } of pauses) places.push([offset, timeS], [offset + length, timeS]);
    for (let k = 0; k < travels.count; k++) places.push([travels.offset[k], travels.timeS[k]]);
    const inside = places
      .filter(([offset]) => offset >= window.start.offset && offset < window.end.offset)
      .map(([offset, timeS]): [number, number] => [this.place(offset), timeS])
      .sort(([a], [b]) => a - b)
      .filter(([offset], k, sorted) => k === 0 || offset !== sorted[k - 1][0]);
    this.offset = inside.map(([offset]) => offset);
    this.timeS = inside.map(([, timeS]) => timeS);
  }

  /** A boundary by the byte of the next line that was kept. */
  place(offset: number): number {
    const { from, to } = this.gaps;
    const k = firstFrom(from.length, (i) => from[i], offset + 1) - 1;
    return k >= 0 && offset < to[k] ? to[k] : offset;
  }

  /** Byte at which the duty of a layer has to be in force, the channel's lead taken off; never before the window. */
  ofLayer(layer: Reading["layers"][number], channel: Channel, profile: Profile): number {
    const leadS = resolveLeadS(channel, profile);
    if (leadS === 0) return this.place(layer.writeAt.offset);
    return this.offset[Math.max(0, this.after(layer.startsAtS - leadS) - 1)];
  }

  /** Position of the first boundary later than an instant. */
  after(timeS: number): number {
    return firstFrom(this.timeS.length, (k) => this.timeS[k], timeS + SAME_S + Number.MIN_VALUE);
  }

  /** Position of the first boundary that is not earlier than an instant and lies behind a byte. */
  from(timeS: number, behind: number): number {
    const later = firstFrom(this.offset.length, (k) => this.offset[k], behind + 1);
    return Math.max(
      later,
      firstFrom(this.timeS.length, (k) => this.timeS[k], timeS - SAME_S),
    );
  }

  /** Position of the first boundary within [from, to]; -1 when there is none. */
  within(from: number, to: number): number {
    const k = firstFrom(this.offset.length, (i) => this.offset[i], from);
    return k < this.offset.length && this.offset[k] <= to ? k : -1;
  }

  get end(): number {
    return this.reading.window.end.offset;
  }
}
