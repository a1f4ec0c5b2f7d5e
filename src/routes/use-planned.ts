import type { Machine } from "#shared/formats/machine.ts";
import type { PlanDocument } from "#shared/formats/plan.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictionDocument } from "#shared/formats/prediction.ts";
import { holds, type Profile } from "#shared/formats/profile.ts";
import type { LayerReading } from "#shared/formats/reading.ts";
import { useLivePlan } from "#src/features/profiles/editor/use-live-plan.ts";
import { type PagePrediction, usePrediction } from "#src/routes/use-prediction.tsx";

interface Input {
  layers: readonly LayerReading[];
  machine: Machine;
  polymer: Polymer | undefined;
  /** a checked profile; undefined while the draft has problems */
  profile: Profile | undefined;
}

interface Planned {
  plan: PlanDocument | undefined;
  /** why there is no plan for the profile as it is */
  refusal: { code: string; message: string; remedy: string; place: { layer?: number; path?: string } } | undefined;
  prediction: PagePrediction;
  /** what belongs to this plan; undefined while it is on its way */
  predicted: PredictionDocument | undefined;
}

/**
 * The plan of a profile that may be changing, and what it is predicted to do. A profile that holds is solved with the
 * prediction, in its worker; every other is planned here and at once, so that no hand waits for a prediction.
 */
export function usePlanned({ layers, machine, polymer, profile }: Input): Planned {
  const solved = profile !== undefined && polymer !== undefined && holds(profile);
  const live = useLivePlan(layers, machine, solved ? undefined : profile, polymer);
  const prediction = usePrediction({ layers, machine, polymer, profile });
  const { forecast, pale, obstacle } = prediction;
  const refused = obstacle && "refusal" in obstacle ? obstacle.refusal : undefined;
  return {
    plan: solved ? forecast?.solved : live.plan,
    refusal: solved ? refused : live.refusal,
    prediction,
    predicted: pale ? undefined : forecast?.prediction,
  };
}
