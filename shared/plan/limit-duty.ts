import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import type { Reasons } from "#shared/plan/reasons.ts";

/**
 * Brings a duty within the channel's lowest and highest.
 *
 * Below its least duty a fan stalls: such a duty becomes off or the least duty, whichever is nearer, the least duty
 * when both are equally near. A heater does not stall, and a rule that asks for a little heat gets the least there is.
 * Off stays off, unless the profile sets a least duty for a heater.
 *
 * @param duty 0-1
 * @returns 0, or within [minDuty, maxDuty]
 */
export function limitDuty(duty: number, channel: ReadyChannel, reasons: Reasons): number {
  const { minDuty, maxDuty, mayBeOff } = channel.limits;
  if (duty > maxDuty) {
    reasons.add(`limited to at most ${channel.text.max}`);
    return maxDuty;
  }
  if (duty >= minDuty || (duty === 0 && mayBeOff)) return duty;
  if (channel.kind === "heater") {
    reasons.add(`raised to at least ${channel.text.min}`);
    return minDuty;
  }
  const off = duty < minDuty - duty;
  reasons.add(`below the fan's dead band of ${channel.text.min}: ${off ? "off" : `raised to ${channel.text.min}`}`);
  return off ? 0 : minDuty;
}
