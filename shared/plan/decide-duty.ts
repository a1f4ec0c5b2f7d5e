import { limitChange } from "#shared/plan/change-limit.ts";
import { applyEndRamp } from "#shared/plan/end-ramp.ts";
import type { PlacedLayer } from "#shared/plan/layer-placer.ts";
import { limitDuty } from "#shared/plan/limit-duty.ts";
import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import type { Reasons } from "#shared/plan/reasons.ts";
import { roundDuty } from "#shared/plan/round-duty.ts";
import { ruleDuty, ruleReason } from "#shared/plan/rules.ts";
import { applyZoneRamp, type ReadyZone } from "#shared/plan/zone-ramp.ts";

/** One channel's duty for one layer, 0-1, and how it came about. */
export interface Decision {
  /** after rule, bed layers and ramps */
  wanted: number;
  /** after lowest, highest and dead band */
  allowed: number;
  /** after the largest change and rounding: the duty to be written */
  duty: number;
  /** the rule, then every step that changed the value */
  reasons: string[];
}

/**
 * Decides one channel's duty for one layer. The order of the steps is part of the file format's contract.
 *
 * @param reasons empty; what it collects is in the decision
 * @param before the channel's duty in the layer before in print order; undefined for the first layer
 */
export function decideDuty(
  channel: ReadyChannel,
  zones: readonly ReadyZone[],
  placed: PlacedLayer,
  before: number | undefined,
  reasons: Reasons,
): Decision {
  const wanted = applyEndRamp(ruledDuty(channel, zones, placed, reasons), channel, placed, reasons);
  const allowed = limitDuty(wanted, channel, reasons);
  const reachable = before === undefined ? allowed : limitChange(allowed, before, channel, reasons);
  const duty = roundDuty(reachable, before, channel, reasons);
  return { wanted, allowed, duty, reasons: reasons.take() };
}

/** The zone's rule with its ramp, or the duty of the bed layers, which no zone ramp touches. */
function ruledDuty(channel: ReadyChannel, zones: readonly ReadyZone[], placed: PlacedLayer, reasons: Reasons): number {
  const { zone, heightUm, rank } = placed;
  const rule = channel.rules[zone];
  const own = ruleDuty(rule, placed, heightUm);
  reasons.add(ruleReason(rule, placed, own));
  if (channel.bedDuty !== undefined && rank <= channel.bedCount) {
    reasons.add(`bed layer ${rank} ${channel.text.bed}`);
    return channel.bedDuty;
  }
  return applyZoneRamp(own, channel.rules, zones, placed, reasons);
}
