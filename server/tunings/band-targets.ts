import type { Tuning } from "#shared/contract/tunings.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { bandsOf, OUTLINE_BANDS, type OutlineLayer, topOf } from "#shared/layers/outline.ts";
import { layerTargets } from "#shared/plan/layer-targets.ts";
import type { PlanLayer } from "#shared/plan/plan.ts";

type Targets = NonNullable<NonNullable<Tuning["plan"]>["targets"]>;

/** What the profile wants of each band of the part's outline: of its highest layer, where it wants several things. */
export function bandTargets(layers: readonly (OutlineLayer & PlanLayer)[], profile: Profile): Targets {
  const wanted = layerTargets(layers, profile);
  const topMm = topOf(layers);
  const targets: Targets = Array.from({ length: OUTLINE_BANDS }, () => "none");
  layers.forEach((layer, position) => {
    const { state } = wanted[position];
    const [first, last] = bandsOf(layer, topMm);
    targets.fill(state === "between" ? "undecided" : state, first, last + 1);
  });
  return targets;
}
