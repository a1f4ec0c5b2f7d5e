import type { DutyEvent } from "#shared/prove/evidence.ts";
import type { Instants } from "#shared/prove/instants.ts";
import type { Target } from "#shared/prove/targets.ts";

/** Print times are sums of floating-point durations, s. */
const SAME_S = 1e-6;

/**
 * Says whether a duty that is not the wanted one is on its way as fast as a largest change per second allows.
 *
 * A change that needs several steps starts in a layer below, so the duty is ahead of that layer's plan; where there is
 * not enough time it arrives late. Either is allowed only where the steps cannot stand elsewhere:
 *
 *     ahead     each step stands at the last boundary that leaves the next one its time, or at the first one that the
 *               step before allows, and all lead to a duty that a later layer wants
 *     behind    the next step stands at the first boundary that the step before allows, and goes toward the wanted duty
 */
export class StaircaseRule {
  /** largest change at once, and the time that has to pass before the next, s */
  readonly step: number;
  readonly everyS: number;

  private readonly minDuty: number;
  private readonly initial: number;
  private readonly events: readonly DutyEvent[];
  private readonly targets: readonly Target[];
  private readonly instants: Instants;
  private readonly pauses: readonly number[];
  private readonly halfStep: number;

  /**
   * @param initial duty before the first event
   * @param events what the plan's lines set, in order
   * @param targets ascending
   * @param pauses bytes at which pauses stand
   */
  constructor(
    rate: { maxDutyPerS: number; minDuty: number; driveSteps: number },
    initial: number,
    events: readonly DutyEvent[],
    targets: readonly Target[],
    instants: Instants,
    pauses: readonly number[],
  ) {
    const { maxDutyPerS, minDuty, driveSteps } = rate;
    this.step = Math.max(1, Math.floor(maxDutyPerS * driveSteps + SAME_S)) / driveSteps;
    this.everyS = Math.max(1, this.step / maxDutyPerS);
    this.halfStep = 0.5 / driveSteps;
    this.minDuty = minDuty;
    this.initial = initial;
    this.events = events;
    this.targets = targets;
    this.instants = instants;
    this.pauses = pauses;
  }

  /** The duty that event `k` sets is in force where target `i` wants another, and every step to it is made at once. */
  behind(k: number, i: number): boolean {
    const { events, targets, instants } = this;
    const { offset, duty } = targets[i];
    const { from, to } = events[k].entry;
    if (from <= offset && offset <= to && !this.isFullStep(this.dutyBefore(k), k, duty)) return false;
    const pause = this.pauses.find((at) => at >= offset) ?? instants.end;
    const until = Math.min(targets[i + 1]?.offset ?? instants.end, pause);
    for (let at = k; Math.abs(events[at].duty - duty) > this.halfStep; at++) {
      const first = this.firstAfter(at);
      if (first === undefined || first >= until) return true;
      const next = events[at + 1];
      if (!next || next.entry.from > first || next.entry.to < first) return false;
      if (!this.isFullStep(events[at].duty, at + 1, duty)) return false;
    }
    return true;
  }

  /** Event `k` goes from a duty toward the wanted one by as much as is allowed at once. */
  private isFullStep(from: number, k: number, wanted: number): boolean {
    const { duty } = this.events[k];
    const change = duty - from;
    const all = wanted - from;
    if (Math.sign(change) !== Math.sign(all)) return false;
    // A fan that falls to off comes to its least duty first.
    const onLeastDuty = change < 0 && duty > 0 && duty < this.minDuty + 2 * this.halfStep;
    return onLeastDuty || Math.abs(change) > Math.min(this.step, Math.abs(all)) - this.halfStep;
  }

  private dutyBefore(k: number): number {
    return k === 0 ? this.initial : this.events[k - 1].duty;
  }

  /** Event `k`, at or behind target `i`, leads to what a later target wants. */
  ahead(k: number, i: number): boolean {
    const { events, targets } = this;
    const direction = Math.sign(events[k].duty - this.dutyBefore(k));
    if (direction === 0) return false;
    let at = k;
    for (let later = i + 1; later < targets.length; later++) {
      const target = targets[later];
      while (at + 1 < events.length && events[at + 1].entry.from <= target.offset) {
        if (!this.isForced(at) || Math.sign(events[at + 1].duty - events[at].duty) !== direction) return false;
        at++;
      }
      if (Math.sign(target.duty - events[k].duty) === direction) return true;
    }
    return false;
  }

  /** The step from event `k` to the next could not stand closer to either. */
  private isForced(k: number): boolean {
    const { instants, everyS } = this;
    const [now, next] = [this.events[k], this.events[k + 1]];
    const first = this.firstAfter(k);
    if (first !== undefined && next.entry.from <= first && first <= next.entry.to) return true;
    const position = instants.within(now.entry.from, now.entry.to);
    return position >= 0 && !(instants.timeS[position + 1] <= next.timeS - everyS - SAME_S);
  }

  /** Byte of the first boundary at which the next step after event `k` may stand. */
  private firstAfter(k: number): number | undefined {
    const { entry, timeS } = this.events[k];
    const position = this.instants.within(entry.from, entry.to);
    const behind = position >= 0 ? this.instants.offset[position] : entry.to;
    return this.instants.offset[this.instants.from(timeS + this.everyS, behind)];
  }
}
