import type { Channel } from "#shared/formats/machine.ts";
import type { DutyLimits } from "#shared/plan/limits.ts";
import type { DutyEvent } from "#shared/prove/evidence.ts";
import { dutySteps } from "#shared/units/duty.ts";

/** A boost ends in time where a boundary allows it; this much longer at most, s. */
const SLACK_S = 5;

/**
 * The events of a channel without its start boosts: a fan that starts from standstill runs at its highest duty for a
 * moment, before the duty that is wanted.
 *
 * @param events what the plan's lines set, in order
 * @param isWanted whether a layer wants what looks like a boost
 */
export function withoutBoosts(
  events: readonly DutyEvent[],
  { kind, startBoostS, drive }: Channel,
  { maxDuty }: DutyLimits,
  isWanted: (event: DutyEvent) => boolean = () => false,
): readonly DutyEvent[] {
  if (kind !== "fan" || startBoostS === 0) return events;
  return events.filter((event, k) => {
    const next = events[k + 1];
    if (k === 0 || events[k - 1].duty > 0 || !next || !(next.duty > 0)) return true;
    const lastsS = next.timeS - event.timeS;
    const inTime = lastsS > startBoostS - 1e-3 && lastsS < startBoostS + SLACK_S;
    const isBoost = inTime && Math.abs(event.duty - maxDuty) < 1 / dutySteps(drive);
    return !isBoost || isWanted(event);
  });
}
