import type { Boundaries } from "#shared/rewrite/boundaries.ts";
import type { Target } from "#shared/rewrite/write.ts";

/** How fast a channel may change: at most `step` at once, and then not again for `everyS`. */
export interface Rate {
  step: number;
  everyS: number;
}

/**
 * The steps that a channel may make: changes of at most the duty allowed in one second, a second apart; where that is
 * less than the drive can resolve, single steps of the drive, further apart.
 *
 * @param maxDutyPerS largest change per second, > 0
 * @param driveSteps steps of the drive from off to full power
 */
export function rateOf(maxDutyPerS: number, driveSteps: number): Rate {
  const steps = Math.max(1, Math.floor(maxDutyPerS * driveSteps + 1e-9));
  return { step: steps / driveSteps, everyS: Math.max(1, steps / driveSteps / maxDutyPerS) };
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
 * @param from duty in force before the first target, and the position from which steps may stand
 * @param targets ascending in position
 * @param end first position at which no step may stand
 * @returns steps in order, at most one a boundary; empty when nothing changes
 */
export function staircase(
  boundaries: Boundaries,
  from: { duty: number; at: number },
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
    const duties = duty(before, target.duty, rate.step);
    if (duties.length === 0) continue;
    const earliest = last ? boundaries.firstFrom(boundaries.list[last.at].timeS + rate.everyS, last.at) : from.at;
    const places =
      onTime(boundaries, target.at, earliest, duties.length, rate.everyS) ??
      late(boundaries, earliest, end, duties.length, rate.everyS);
    for (const [k, at] of places.entries()) steps.push({ at, duty: duties[k] });
  }
  return steps;
}

/** The duties of a staircase, the last one being the wanted one. */
function duty(from: number, to: number, step: number): number[] {
  const count = Math.ceil(Math.abs(to - from) / step - 1e-6);
  const sign = to > from ? 1 : -1;
  return Array.from({ length: count }, (_, k) => (k === count - 1 ? to : from + sign * step * (k + 1)));
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
    if (at < earliest || boundaries.list[at].timeS > wanted + 1e-6) return undefined;
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
