import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictionDocument } from "#shared/formats/prediction.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { channelDuties } from "#shared/plan/channel-duties.ts";
import { layerTargets } from "#shared/plan/layer-targets.ts";
import type { Plan, PlanLayer } from "#shared/plan/plan.ts";
import type { PredictionLayer } from "#shared/prediction/model.ts";
import { predict } from "#shared/prediction/predict.ts";

export interface PredictPlanInput {
  /** in print order */
  layers: readonly (PlanLayer & PredictionLayer)[];
  machine: Machine;
  profile: Profile;
  polymer: Polymer;
  plan: Plan;
  /** also a hot and a cold run (default) */
  band?: boolean;
}

/**
 * What a plan is expected to make of every layer, against the targets of the profile's zones.
 *
 * @throws Refusal `zone-missing` for a layer outside all zones, and those of `predict`
 */
export function predictPlan({ layers, machine, profile, polymer, plan, band }: PredictPlanInput): PredictionDocument {
  const duties = channelDuties(plan, layers, machine, profile);
  const wanted = layerTargets(layers, profile).map(({ state }) => state);
  return predict({ layers, machine, polymer, duties, wanted, margins: profile.margins, band });
}
