import type { Channel } from "#shared/formats/machine.ts";
import type { DutyLimits } from "#shared/plan/limits.ts";
import { type Boundaries, TOLERANCE_S } from "#shared/rewrite/boundaries.ts";
import { highestDuty, SAME, type Target } from "#shared/rewrite/write.ts";
import { dutySteps, roundDutyInward } from "#shared/units/duty.ts";

/** How fast a channel may change: at most `step` at once, and then not again for `everyS`. */
export interface Rate {
  step: number;
  everyS: number;
  /** below leastDuty a fan stalls: between off and it nothing is written, nor above mostDuty; 0-1 */
  leastDuty: number;
  mostDuty: number;
}

/**
 * The steps that a channel may make: changes of at most the duty allowed in one second, a second apart; where that is
 * less than the drive can resolve, single steps of the drive, further apart.
 *
 * @param maxDutyPerS finite
 */
export function rateOf(channel: Channel, limits: DutyLimits): Rate {
  const { maxDutyPerS, minDuty, maxDuty } = limits;
  const driveSteps = dutySteps(channel.drive);
  const steps = Math.max(1, Math.floor(maxDutyPerS * driveSteps + 1e-9));
  return {
    step: steps / driveSteps,
    everyS: Math.max(1, steps / driveSteps / maxDutyPerS),
    leastDuty: channel.kind === "fan" ? roundDutyInward(minDuty, driveSteps, minDuty, maxDuty) : 0,
    mostDuty: highestDuty(channel, limits),
  };
}

/** Where a staircase starts: the duty in force and since when, and the position from which steps may stand. */
export interface Start {
  duty: number;
  sinceS: number;
  at: number;
}

/**
 * Turns duties wanted at instants into steps that a rate limit allows. Each staircase ends at the wanted boundary and
 * starts early, in the layer below; every step stands at a boundary at least one interval before the next. Where there
 * is not enough time the staircase starts as early as the one before it lets it and arrives late.
 *
 *     duty      .--- wanted at t          .------
 *             .-'                       .-'
 *     -------'  1 s steps, on time    |' starts late, arrives late
 *
 * @param targets ascending in position
 * @param end first position at which no step may stand
 * @returns steps in order, at most one a boundary; empty when nothing changes
 */
export function staircase(
  boundaries: Boundaries,
  from: Start,
  targets: readonly Target[],
  end: number,
  rate: Rate,
): Target[] {
  const steps: Target[] = [];
  for (const target of targets) {
    // A staircase that ran late yields to the next wanted duty.
    while (steps.length > 0 && steps[steps.length - 1].at >= target.at) steps.pop();
    const last = steps[steps.length - 1];
    const before = last ? last.duty : from.duty;
    const duties = dutiesBetween(before, target.duty, rate);
    if (duties.length === 0) continue;
    const earliest = last
      ? boundaries.firstFrom(boundaries.list[last.at].timeS + rate.everyS, last.at)
      : boundaries.firstFrom(from.sinceS + rate.everyS, from.at - 1);
    const places =
      onTime(boundaries, target.at, earliest, duties.length, rate.everyS) ??
      late(boundaries, earliest, end, duties.length, rate.everyS);
    for (const [k, at] of places.entries()) steps.push({ at, duty: duties[k] });
  }
  return steps;
}

/** The duties of a staircase, the last one being the wanted one. */
function dutiesBetween(from: number, to: number, rate: Rate): number[] {
  const duties: number[] = [];
  for (let duty = from; Math.abs(to - duty) > SAME; duties.push(duty)) duty = nextDuty(duty, to, rate);
  return duties;
}

/** A fan's dead band is crossed at once, and so is what lies above the limit: a file may have set that before. */
function nextDuty(duty: number, to: number, { step, leastDuty, mostDuty }: Rate): number {
  if (Math.abs(to - duty) <= step + SAME) return to;
  if (to > duty) return Math.max(duty + step, leastDuty);
  const lower = Math.min(duty - step, mostDuty);
  if (lower >= leastDuty) return lower;
  return duty > leastDuty + SAME ? leastDuty : to;
}

/** Boundaries for `count` steps that end at `last`, or undefined when the first would stand before `earliest`. */
function onTime(
  boundaries: Boundaries,
  last: number,
  earliest: number,
  count: number,
  everyS: number,
): number[] | undefined {
  if (last < earliest) return undefined;
  const places = [last];
  for (let k = 1; k < count; k++) {
    const wanted = boundaries.list[places[0]].timeS - everyS;
    const at = boundaries.lastBefore(wanted);
    if (at < earliest || boundaries.list[at].timeS > wanted + TOLERANCE_S) return undefined;
    places.unshift(at);
  }
  return places;
}

/** Boundaries for up to `count` steps, each as early as it may be. */
function late(boundaries: Boundaries, earliest: number, end: number, count: number, everyS: number): number[] {
  const places: number[] = [];
  for (let at = earliest; at < end && places.length < count; ) {
    places.push(at);
    at = boundaries.firstFrom(boundaries.list[at].timeS + everyS, at);
  }
  return places;
}
