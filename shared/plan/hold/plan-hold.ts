import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { goalsOf } from "#shared/plan/hold/goals.ts";
import { holdAdvice } from "#shared/plan/hold/hold-advice.ts";
import { Lever } from "#shared/plan/hold/lever.ts";
import { type HoldCase, solveLevers } from "#shared/plan/hold/solver.ts";
import { layerPlacer } from "#shared/plan/layer-placer.ts";
import { layerTargets } from "#shared/plan/layer-targets.ts";
import type { Plan, PlanLayer } from "#shared/plan/plan.ts";
import { marginsOf } from "#shared/polymers/material.ts";
import { makeModel } from "#shared/prediction/model.ts";

export interface HoldInput {
  /** in print order */
  layers: readonly PlanLayer[];
  machine: Machine;
  /** fits machine and polymer */
  profile: Profile;
  polymer: Polymer;
}

/**
 * Plans a profile of which rules hold: duties are solved so that each layer reaches its zone's state, judged on its
 * predicted crystallinity, on being solid in time and on welding. Layers that can't be held are advice, with what binds
 * them and the smallest change that would do. The typical inputs are taken, not their ranges.
 *
 * @throws Refusal `zone-missing` or `limits-conflict`
 */
export function planHold({ layers, machine, profile, polymer }: HoldInput): Plan {
  const model = makeModel({ layers: layers.map(known), machine, polymer });
  const margins = marginsOf(polymer, profile.margins);
  const warmC = model.material.tgC + margins.aboveTgC;
  const targets = layerTargets(layers, profile);
  const placeAt = layerPlacer(layers, profile.zones);
  const hold: HoldCase = {
    layers,
    machine,
    profile,
    model,
    margins,
    targets,
    zone: layers.map((_, position) => placeAt(position).zone),
    levers: profile.zones.map((zone) => new Lever(zone, machine, profile, model.surroundings, warmC)),
    goals: goalsOf(targets, model.layers, model.material, margins),
  };
  const outcome = solveLevers(hold);
  const advice = [...outcome.plan.advice, ...holdAdvice(hold, outcome, polymer)];
  return { ...outcome.plan, advice: advice.sort((a, b) => a.layer - b.layer) };
}

/** What a layer does not say is taken as unknown; the model assumes something for it. */
const known = (layer: PlanLayer) => ({
  ...layer,
  areaMm2: layer.areaMm2 ?? 0,
  outlineMm: layer.outlineMm ?? 0,
  nozzleC: layer.nozzleC ?? null,
  bedC: layer.bedC ?? null,
  waits: layer.waits ?? [],
});
