import type { Zone } from "#shared/formats/profile.ts";
import { micrometres } from "#shared/plan/heights.ts";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { refuseZoneMissing } from "#shared/plan/zone-missing.ts";
import { upperBorders, zoneAt, zonePosition } from "#shared/plan/zones.ts";

/** Where a layer lies in the profile and in its object. Heights are tops, in whole micrometres above the bed. */
export interface PlacedLayer {
  layer: PlanLayer;
  /** in print order, from 0 */
  position: number;
  /** index into the profile's zones */
  zone: number;
  heightUm: number;
  /** 1 for the layer on the bed, counted per object */
  rank: number;
  /** by zone: the height at which it begins in this object; NaN where the object has no layer below it */
  zoneStartUm: Float64Array;
  /** from the layer's top to the top of the print's last object; Infinity in the objects before it */
  belowEndUm: number;
}

/** One object of the print while its layers are gone through. */
interface ObjectSoFar {
  topUm: number;
  /** by zone: the last zone position it covers, in the unit of the profile */
  borders: Float64Array;
  zoneStartUm: Float64Array;
  rank: number;
  reachedUm: number;
  reachedZone: number;
}

/**
 * Finds the layers' places. Ask for them once each and in print order: how far an object has come decides where a zone
 * begins in it.
 *
 * In millimetres a zone begins at its border. Layer numbers and fractions have no height of their own: there the zone
 * begins at the top of the object's last layer below it.
 *
 * @returns a function of the position in print order, from 0. It throws Refusal `zone-missing` for a layer outside all
 * zones or without a height
 */
export function layerPlacer(layers: readonly PlanLayer[], zones: readonly Zone[]): (position: number) => PlacedLayer {
  const objects = findObjects(layers, zones);
  const last = layers.length === 0 ? undefined : objects.get(layers[layers.length - 1].object);
  return (position) => {
    const layer = layers[position];
    const object = objects.get(layer.object)!;
    const heightUm = micrometres(layer.zMm);
    const zone = zoneAt(zonePosition(layer, zones), object.borders);
    if (zone < 0) refuseZoneMissing(layer, zones, object.topUm);
    if (zones[zone].unit !== "mm") noteZoneStart(object, zone);
    object.rank++;
    object.reachedUm = heightUm;
    object.reachedZone = zone;
    const { rank, zoneStartUm, topUm } = object;
    const belowEndUm = object === last ? topUm - heightUm : Number.POSITIVE_INFINITY;
    return { layer, position, zone, heightUm, rank, zoneStartUm, belowEndUm };
  };
}

function noteZoneStart(object: ObjectSoFar, zone: number): void {
  if (object.reachedZone < 0 || zone <= object.reachedZone || !Number.isNaN(object.zoneStartUm[zone])) return;
  object.zoneStartUm[zone] = object.reachedUm;
}

function findObjects(layers: readonly PlanLayer[], zones: readonly Zone[]): Map<number, ObjectSoFar> {
  const tops = new Map<number, number>();
  for (const { object, zMm } of layers) {
    const top = tops.get(object);
    const heightUm = micrometres(zMm);
    if (top === undefined || heightUm > top) tops.set(object, heightUm);
  }
  const startsUm = Float64Array.from(zones, ({ unit, from }) => (unit === "mm" ? micrometres(from) : Number.NaN));
  const objects = new Map<number, ObjectSoFar>();
  for (const [object, topUm] of tops) {
    objects.set(object, {
      topUm,
      borders: upperBorders(zones, topUm),
      zoneStartUm: startsUm.slice(),
      rank: 0,
      reachedUm: 0,
      reachedZone: -1,
    });
  }
  return objects;
}
