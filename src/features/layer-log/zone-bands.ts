import type { LayerStack } from "#src/features/layer-log/layer-stack.ts";

/** What the log needs to know of a profile's zone. */
export interface BandZone {
  name: string;
  from: number;
  to?: number;
  unit: "mm" | "layer" | "fraction";
  target: "amorphous" | "semi-crystalline" | "none";
  rampMm?: number;
}

/** A zone's band on the height axis; one for every object that reaches it. */
export interface ZoneBand {
  /** index into the zones */
  zone: number;
  name: string;
  target: BandZone["target"];
  fromMm: number;
  toMm: number;
  rampMm: number;
}

/** Zones as bands on the axis. Borders given in layers or as a fraction lie on the tops of layers. */
export function zoneBands(zones: readonly BandZone[], stack: LayerStack): ZoneBand[] {
  return stack.objects.flatMap((object) => {
    const bands: ZoneBand[] = [];
    zones.forEach((zone, z) => {
      const fromMm = z === 0 ? object.baseMm : borderMm(zone.from, zone.unit, stack, object);
      const toMm = zone.to === undefined ? object.topMm : borderMm(zone.to, zone.unit, stack, object);
      if (!(toMm > fromMm)) return;
      bands.push({ zone: z, name: zone.name, target: zone.target, fromMm, toMm, rampMm: zone.rampMm ?? 0 });
    });
    return bands;
  });
}

/** Height on the axis of a border of a zone, kept within the object. */
export function borderMm(
  border: number,
  unit: BandZone["unit"],
  stack: LayerStack,
  object: LayerStack["objects"][number],
): number {
  const { baseMm, topMm, first, last } = object;
  if (unit === "layer") {
    // Layer n lies below the border "n". Numbers go on counting through the objects.
    const below = Math.round(border) - stack.index[first];
    if (below < 0) return baseMm;
    return stack.topMm[Math.min(first + below, last)];
  }
  const mm = unit === "mm" ? border : border * (topMm - baseMm);
  return Math.min(Math.max(baseMm + mm, baseMm), topMm);
}
