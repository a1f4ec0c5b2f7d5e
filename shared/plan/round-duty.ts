import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import type { Reasons } from "#shared/plan/reasons.ts";
import { roundDutyInward } from "#shared/units/duty.ts";

/**
 * Rounds a duty to a step of the drive, nearest, but never past a limit or past the largest change.
 *
 * @param duty 0, or within the channel's limits and reachable from the layer before
 * @param before duty of the layer before in print order; undefined for the first layer
 * @returns a whole number of steps divided by `channel.steps`
 */
export function roundDuty(duty: number, before: number | undefined, channel: ReadyChannel, reasons: Reasons): number {
  if (duty === 0) return 0;
  const { steps, limits } = channel;
  let { minDuty: lo, maxDuty: hi } = limits;
  if (before !== undefined) {
    lo = Math.max(lo, before - limits.maxDutyPerLayer);
    hi = Math.min(hi, Math.max(before + limits.maxDutyPerLayer, channel.leastDuty));
  }
  const rounded = roundDutyInward(duty, steps, lo, hi);
  if (Math.abs(rounded - duty) > INVISIBLE) reasons.add(channel.roundReason(Math.round(rounded * steps)));
  return rounded;
}

/** Less than the last digits of a sum of duties is no change. */
const INVISIBLE = 1e-9;
