import type { Profile, Zone } from "#shared/formats/profile.ts";
import { layerPlacer, type PlacedLayer } from "#shared/plan/layer-placer.ts";
import type { PlanLayer } from "#shared/plan/plan.ts";

/** The state that a layer is to have; in a graded zone it lies between the two. */
export type TargetState = Zone["target"] | "between";

/** What is wanted of a layer. */
export interface LayerTarget {
  state: TargetState;
  /** 0: wholly amorphous … 1: wholly semi-crystalline; NaN where nothing is wanted */
  share: number;
}

const WHOLE: Record<Zone["target"], LayerTarget> = {
  amorphous: { state: "amorphous", share: 0 },
  "semi-crystalline": { state: "semi-crystalline", share: 1 },
  none: { state: "none", share: Number.NaN },
};

/**
 * What the profile wants of every layer, by position in print order.
 *
 * @throws Refusal `zone-missing` for a layer outside all zones
 */
export function layerTargets(layers: readonly PlanLayer[], profile: Profile): LayerTarget[] {
  const placeAt = layerPlacer(layers, profile.zones);
  const placed = layers.map((_, position) => placeAt(position));
  const keyOf = ({ layer, zone }: PlacedLayer) => layer.object * profile.zones.length + zone;
  const spans = new Map<number, ZoneSpan>();
  for (const place of placed) {
    const span = spans.get(keyOf(place));
    if (span) span.toUm = place.heightUm;
    else spans.set(keyOf(place), { fromUm: place.heightUm, toUm: place.heightUm, passed: 0 });
  }
  return placed.map((place) => targetIn(profile.zones[place.zone], place, spans.get(keyOf(place))!));
}

/** A zone within one object: the tops of its lowest and highest layer, µm, and how many layers were gone through. */
interface ZoneSpan {
  fromUm: number;
  toUm: number;
  passed: number;
}

function targetIn({ target, pattern }: Zone, { heightUm }: PlacedLayer, span: ZoneSpan): LayerTarget {
  if (pattern === undefined) return WHOLE[target];
  if (pattern.kind === "alternating") {
    const { amorphousLayers, semiCrystallineLayers, first } = pattern;
    const step = span.passed++ % (amorphousLayers + semiCrystallineLayers);
    const inFirst = step < (first === "amorphous" ? amorphousLayers : semiCrystallineLayers);
    return WHOLE[inFirst === (first === "amorphous") ? "amorphous" : "semi-crystalline"];
  }
  const way = span.toUm > span.fromUm ? (heightUm - span.fromUm) / (span.toUm - span.fromUm) : 0;
  const share = WHOLE[pattern.from].share + (WHOLE[pattern.to].share - WHOLE[pattern.from].share) * way;
  if (share === 0 || share === 1) return WHOLE[share === 0 ? "amorphous" : "semi-crystalline"];
  return { state: "between", share };
}
