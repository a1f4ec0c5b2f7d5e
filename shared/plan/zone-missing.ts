import type { Zone } from "#shared/formats/profile.ts";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { Refusal } from "#shared/refusal.ts";

const AT = { mm: "mm", layer: "layer number", fraction: "of its object's height" } as const;

/**
 * Refuses a layer that no zone covers.
 *
 * @param objectTopUm top of the layer's object, micrometres
 * @throws Refusal `zone-missing` naming the layer, its height and the nearest zone
 */
export function refuseZoneMissing(layer: PlanLayer, zones: readonly Zone[], objectTopUm: number): never {
  const { index, zMm } = layer;
  const place = { layer: index };
  if (!Number.isFinite(zMm)) {
    const message = `Layer ${index} has no height, so it lies in no zone of the profile.`;
    throw new Refusal("zone-missing", message, "Check the toolpath's Z moves, or slice the part again.", place);
  }
  if (zones.length === 0) {
    const message = `The profile has no zone, so layer ${index} at ${round(zMm)} mm has no rule.`;
    throw new Refusal("zone-missing", message, "Give the profile at least one zone.", place);
  }
  const { unit } = zones[0];
  const position = { mm: zMm, layer: index, fraction: (zMm * 1000) / objectTopUm }[unit];
  const nearest = zones.reduce((best, zone) => (distance(zone, position) < distance(best, position) ? zone : best));
  throw new Refusal(
    "zone-missing",
    `Layer ${index} at ${round(zMm)} mm lies in no zone of the profile; nearest is zone "${nearest.name}" (${reach(nearest)}).`,
    `Let zone "${nearest.name}" reach it${position > nearest.from ? ', or leave out "to" in the last zone' : ""}.`,
    place,
  );
}

function distance({ from, to = Number.POSITIVE_INFINITY }: Zone, position: number): number {
  return Math.max(from - position, position - to, 0);
}

function reach({ from, to, unit }: Zone): string {
  return `${from} to ${to ?? "the top"} ${AT[unit]}`;
}

function round(mm: number): number {
  return Math.round(mm * 1000) / 1000;
}
