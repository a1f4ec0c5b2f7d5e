import type { Zone } from "#shared/formats/profile.ts";
import { micrometres } from "#shared/plan/heights.ts";
import type { PlanLayer } from "#shared/plan/plan.ts";

/**
 * Zones lie one upon the other without gaps, so their upper borders alone say which one a layer belongs to: a zone
 * covers (from, to], the first one from the first layer on. Positions are whole numbers: micrometres of the layer's
 * top for zones in mm and in fractions of the object, layer numbers for zones in layers.
 */
export function upperBorders(zones: readonly Zone[], objectTopUm: number): Float64Array {
  return Float64Array.from(zones, ({ to, unit }) => {
    if (to === undefined) return Number.POSITIVE_INFINITY;
    if (unit === "layer") return to;
    return unit === "mm" ? micrometres(to) : Math.round(to * objectTopUm);
  });
}

/** A layer's position in the unit in which the zones are compared: its number, or its top in micrometres. */
export function zonePosition(layer: PlanLayer, zones: readonly Zone[]): number {
  return zones.length > 0 && zones[0].unit === "layer" ? layer.index : micrometres(layer.zMm);
}

/**
 * The zone that covers a position.
 *
 * @param borders upper borders, ascending
 * @returns index of the zone; -1 below the first and above the last one, and for a position that is no number
 */
export function zoneAt(position: number, borders: Float64Array): number {
  if (!(position > 0) || position === Number.POSITIVE_INFINITY) return -1;
  let low = 0;
  let high = borders.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (position <= borders[middle]) high = middle;
    else low = middle + 1;
  }
  return low < borders.length ? low : -1;
}
