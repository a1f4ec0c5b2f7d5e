import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile, Zone } from "#shared/formats/profile.ts";
import { drivenChannels } from "#shared/plan/driven-channels.ts";
import { micrometres } from "#shared/plan/heights.ts";
import { type DutyLimits, effectiveLimits } from "#shared/plan/limits.ts";
import { givenText } from "#shared/plan/quantity-text.ts";
import { reasonTable } from "#shared/plan/reasons.ts";
import { type Held, type ReadyRule, readyRule } from "#shared/plan/rules.ts";
import { Refusal } from "#shared/refusal.ts";
import { dutySteps, roundDutyInward } from "#shared/units/duty.ts";

/** One driven channel with all that holds for it, looked up once before the layers are gone through. */
export interface ReadyChannel {
  id: string;
  kind: Channel["kind"];
  /** what a heater steps down to, 0-1 */
  idleDuty: number;
  /** one rule for every zone of the profile */
  rules: ReadyRule[];
  /** duty of the first `bedCount` layers of an object; undefined: they follow the zones */
  bedDuty: number | undefined;
  bedCount: number;
  limits: DutyLimits;
  endRampUm: number;
  /** steps of the drive between off and full */
  steps: number;
  /** lowest and highest duty other than off that the drive can express within the limits */
  leastDuty: number;
  mostDuty: number;
  /** the reason for rounding to a step, e.g. `rounded to 108/255` */
  roundReason: (step: number) => string;
  /** limits as they stand in reasons and advice */
  text: { min: string; max: string; perLayer: string; bed: string };
}

/**
 * Makes all channels ready that the profile drives.
 *
 * @param profile fits the machine
 * @throws Refusal `limits-conflict`
 */
export function readyChannels(machine: Machine, profile: Profile, held: Held): ReadyChannel[] {
  return drivenChannels(machine, profile).map((channel) => readyChannel(channel, profile, held));
}

function readyChannel(channel: Channel, profile: Profile, held: Held): ReadyChannel {
  const limits = effectiveLimits(channel, profile);
  const steps = dutySteps(channel.drive);
  const bedDuty = profile.bedLayers.duty[channel.id];
  return {
    id: channel.id,
    kind: channel.kind,
    idleDuty: channel.idleDuty,
    rules: profile.zones.map((zone, z) => ruleInZone(zone, z, channel, held)),
    bedDuty,
    bedCount: bedDuty === undefined ? 0 : profile.bedLayers.count,
    limits,
    endRampUm: micrometres(limits.endRampMm),
    steps,
    ...reachableDuties(channel.id, limits, steps),
    roundReason: reasonTable(steps, (step) => `rounded to ${step}/${steps}`),
    text: {
      min: givenText(limits.minDuty),
      max: givenText(limits.maxDuty),
      perLayer: givenText(limits.maxDutyPerLayer),
      bed: bedDuty === undefined ? "" : `of ${profile.bedLayers.count}: ${givenText(bedDuty)}`,
    },
  };
}

function ruleInZone(zone: Zone, z: number, channel: Channel, held: Held): ReadyRule {
  const side = channel.kind === "fan" ? "cooling" : "heating";
  const rule = zone[side].find((candidate) => candidate.channel === channel.id);
  if (rule !== undefined) return readyRule(zone, z, rule, held);
  throw new Refusal(
    "channel-not-driven",
    `Zone "${zone.name}" has no rule for ${channel.id}, which other zones drive.`,
    `Give ${channel.id} a rule in zone "${zone.name}".`,
    { path: `zones[${z}]` },
  );
}

/** A decimal limit such as 0.6 may lie on a step and yet miss it in the last binary digit. */
const TOLERANCE = 1e-8;

function reachableDuties(id: string, { minDuty, maxDuty }: DutyLimits, steps: number) {
  const leastDuty = roundDutyInward(minDuty, steps, minDuty, maxDuty);
  const mostDuty = roundDutyInward(maxDuty, steps, minDuty, maxDuty);
  // Rounding stays below maxDuty at all costs, so a result below minDuty says that there is no step between them.
  if (leastDuty > minDuty - TOLERANCE) return { leastDuty, mostDuty };
  throw new Refusal(
    "limits-conflict",
    `The output of ${id} has ${steps} steps, and none lies between ${minDuty} and ${maxDuty}.`,
    `Widen the limits of ${id} to at least one step.`,
    { path: `limits.${id}` },
  );
}
