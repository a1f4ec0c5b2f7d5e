import type { Channel } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { Refusal } from "#shared/refusal.ts";

/**
 * The limits that hold for a channel: the machine's, narrowed by the profile's. Duties 0-1; Infinity: no limit.
 */
export interface DutyLimits {
  /** lowest duty other than off */
  minDuty: number;
  maxDuty: number;
  /**
   * Off is allowed although it lies below minDuty. A fan may always be off, and a heater unless the profile itself sets
   * a minDuty for it: the machine's says how little its output can do, the profile's how little the part may get.
   */
  mayBeOff: boolean;
  /** largest change from the layer before in print order; crossing the gap between off and minDuty is exempt */
  maxDutyPerLayer: number;
  /** largest change in one second, held by whoever writes the commands */
  maxDutyPerS: number;
  /** a heater steps down to its idle duty over the last millimetres of the print; 0: it does not */
  endRampMm: number;
}

/**
 * Combines the machine's and the profile's limits of one channel; the narrower one holds.
 *
 * @throws Refusal `limits-conflict` where the two leave no duty between them
 */
export function effectiveLimits(channel: Channel, profile: Profile): DutyLimits {
  const own = profile.limits[channel.id] ?? {};
  const maxDuty = Math.min(channel.maxDuty, own.maxDuty ?? 1);
  const limits = {
    // A profile may keep a channel off altogether, whatever the least duty of its output.
    minDuty: maxDuty === 0 ? 0 : Math.max(channel.minDuty, own.minDuty ?? 0),
    maxDuty,
    mayBeOff: channel.kind === "fan" || (own.minDuty ?? 0) === 0,
    maxDutyPerLayer: own.maxDutyPerLayer ?? Number.POSITIVE_INFINITY,
    maxDutyPerS: Math.min(channel.maxDutyPerS ?? Number.POSITIVE_INFINITY, own.maxDutyPerS ?? Number.POSITIVE_INFINITY),
    endRampMm: channel.kind === "heater" ? (own.endRampMm ?? 0) : 0,
  };
  if (limits.minDuty > limits.maxDuty) refuseConflict(channel.id, limits);
  return limits;
}

function refuseConflict(id: string, { minDuty, maxDuty }: DutyLimits): never {
  throw new Refusal(
    "limits-conflict",
    `Machine and profile together leave ${id} no duty: at least ${minDuty} and at most ${maxDuty}.`,
    `Give ${id} limits in the profile that lie within the machine's.`,
    { path: `limits.${id}` },
  );
}
