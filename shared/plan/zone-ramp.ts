import type { Zone } from "#shared/formats/profile.ts";
import { micrometres } from "#shared/plan/heights.ts";
import type { PlacedLayer } from "#shared/plan/layer-placer.ts";
import { type Reasons, reasonTable } from "#shared/plan/reasons.ts";
import { type ReadyRule, ruleDuty } from "#shared/plan/rules.ts";

/** What a zone's ramp needs to know. */
export interface ReadyZone {
  name: string;
  /** height over which duties run from the lower zone's value to this zone's, micrometres; 0: none */
  rampUm: number;
  /** the reason for a share of the ramp in per cent, e.g. `ramp from zone base: 40 % of 0.6 mm` */
  rampReason: (percent: number) => string;
}

export function readyZones(zones: readonly Zone[]): ReadyZone[] {
  return zones.map(({ name, rampMm }, z) => ({
    name,
    rampUm: micrometres(rampMm),
    rampReason: reasonTable(100, (percent) => `ramp from zone ${zones[z - 1]?.name}: ${percent} % of ${rampMm} mm`),
  }));
}

/**
 * Runs a duty from the lower zone's value at the border to this zone's own, linearly over the ramp's height.
 *
 * The lower zone's value is its rule asked for this very layer, but at the height of the border, so a curve over height
 * goes on where it ended, and so does what was held in the zone's highest layer. Where the lower zone's own ramp has not ended at the border, its value there is the ramped
 * one: however short a zone, no duty jumps at a ramped border.
 *
 * @param own this zone's value for the layer, 0-1
 * @param rules the channel's rule in every zone
 */
export function applyZoneRamp(
  own: number,
  rules: readonly ReadyRule[],
  zones: readonly ReadyZone[],
  placed: PlacedLayer,
  reasons: Reasons,
): number {
  const { zone, heightUm } = placed;
  const share = rampShare(zones, placed, zone, heightUm);
  if (share === 1) return own;
  const border = dutyAt(rules, zones, placed, zone - 1, placed.zoneStartUm[zone]);
  if (border === own) return own;
  reasons.add(zones[zone].rampReason(Math.round(share * 100)));
  return border + (own - border) * share;
}

/** A zone's value for a layer at some height, its ramp included. */
function dutyAt(
  rules: readonly ReadyRule[],
  zones: readonly ReadyZone[],
  placed: PlacedLayer,
  zone: number,
  heightUm: number,
): number {
  const own = ruleDuty(rules[zone], placed, heightUm);
  const share = rampShare(zones, placed, zone, heightUm);
  if (share === 1) return own;
  const border = dutyAt(rules, zones, placed, zone - 1, placed.zoneStartUm[zone]);
  return border + (own - border) * share;
}

/** How much of a zone's ramp is behind, 0-1; 1 where it has none, or nothing of the object lies below the zone. */
function rampShare(zones: readonly ReadyZone[], placed: PlacedLayer, zone: number, heightUm: number): number {
  const { rampUm } = zones[zone];
  if (zone === 0 || rampUm === 0) return 1;
  const share = (heightUm - placed.zoneStartUm[zone]) / rampUm;
  return share < 1 ? Math.max(0, share) : 1;
}
