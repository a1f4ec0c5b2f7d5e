import { checkFit } from "#shared/formats/fit.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { ChannelAdvice } from "#shared/plan/channel-advice.ts";
import { decideDuty } from "#shared/plan/decide-duty.ts";
import { layerPlacer } from "#shared/plan/layer-placer.ts";
import type { Plan, PlanLayer, PlannedLayer } from "#shared/plan/plan.ts";
import { readyChannels } from "#shared/plan/ready-channel.ts";
import { Reasons } from "#shared/plan/reasons.ts";
import { readyZones } from "#shared/plan/zone-ramp.ts";

/** What a plan is made from. */
export interface PlanInput {
  /** in print order */
  layers: readonly PlanLayer[];
  machine: Machine;
  profile: Profile;
}

/**
 * Plans the duty of every channel that the profile drives, for every layer, with the reason for each: the zone's rule,
 * then bed layers, zone ramp and end ramp, then lowest and highest duty and the fan's dead band, then the largest change
 * from the layer before, then rounding to a step of the drive. Motion is never changed; what fan and heater cannot put
 * right is advice. The same input gives the same plan.
 *
 * The largest change per second is not applied here: it is a matter of how a change is written. Where it needs more
 * time than there is, advice says so.
 *
 * @throws Refusal `zone-missing` for a layer outside all zones, `limits-conflict` where machine and profile leave a
 * channel no duty, and those of `checkFit` where the profile does not fit the machine
 */
export function planDuties({ layers, machine, profile }: PlanInput): Plan {
  checkFit(machine, profile);
  const zones = readyZones(profile.zones);
  const channels = readyChannels(machine, profile);
  const advisers = channels.map((channel) => new ChannelAdvice(channel));
  // Copies of an object that has its keys already are much cheaper than objects that get theirs one by one.
  const noDuty: Record<string, number> = Object.fromEntries(channels.map(({ id }) => [id, 0]));
  const noReason: Record<string, string[]> = Object.fromEntries(channels.map(({ id }) => [id, []]));
  const reasons = new Reasons();
  const placeAt = layerPlacer(layers, profile.zones);
  const planned: PlannedLayer[] = [];
  for (let position = 0; position < layers.length; position++) {
    const placed = placeAt(position);
    const duty = { ...noDuty };
    const reason = { ...noReason };
    for (let c = 0; c < channels.length; c++) {
      const { id } = channels[c];
      const before = position === 0 ? undefined : planned[position - 1].duty[id];
      const decision = decideDuty(channels[c], zones, placed, before, reasons);
      duty[id] = decision.duty;
      reason[id] = decision.reasons;
      advisers[c].noteLayer(placed, decision);
    }
    planned.push({ index: placed.layer.index, duty, reason });
  }
  const zoneNames = zones.map(({ name }) => name);
  const advice = advisers.flatMap((adviser) => adviser.advice(zoneNames));
  return { format: "quenchline.plan/1", layers: planned, advice: advice.sort((a, b) => a.layer - b.layer) };
}
