import type { Channel } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";

/**
 * How long before a layer begins its duty is commanded, s, >= 0.
 *
 * The profile gives seconds, or "settle" for half the time the channel takes to reach 90 % of a change. An output that
 * acts when its line is read is early by up to the machine's buffer time already, so that time comes off.
 */
export function resolveLeadS(channel: Channel, profile: Profile): number {
  const wanted = profile.lead[channel.id] ?? 0;
  const leadS = wanted === "settle" ? channel.settleS / 2 : wanted;
  const bufferS = channel.acts === "queued" ? 0 : channel.acts.immediate;
  return Math.max(0, leadS - bufferS);
}
