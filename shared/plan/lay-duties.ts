import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { ChannelAdvice } from "#shared/plan/channel-advice.ts";
import { decideDuty } from "#shared/plan/decide-duty.ts";
import { layerPlacer } from "#shared/plan/layer-placer.ts";
import type { Plan, PlanLayer, PlannedLayer } from "#shared/plan/plan.ts";
import { readyChannels } from "#shared/plan/ready-channel.ts";
import { Reasons } from "#shared/plan/reasons.ts";
import type { Held } from "#shared/plan/rules.ts";
import { readyZones } from "#shared/plan/zone-ramp.ts";

/**
 * Lays down the duty of every channel for every layer, each from its rule through all the steps after it.
 *
 * @param profile fits the machine
 * @param held the duties of rules that are solved
 * @throws Refusal `zone-missing` or `limits-conflict`
 */
export function layDuties(layers: readonly PlanLayer[], machine: Machine, profile: Profile, held: Held): Plan {
  const zones = readyZones(profile.zones);
  const channels = readyChannels(machine, profile, held);
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
