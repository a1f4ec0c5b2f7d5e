import { useEffect, useState } from "react";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Plan, PlanLayer } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { Refusal } from "#shared/refusal.ts";

export interface LivePlan {
  /** the latest plan that could be made; it stays while the draft is not usable */
  plan: Plan | undefined;
  /** why there is no plan for the draft as it is */
  refusal: Refusal | undefined;
}

/**
 * Plans again whenever the profile changes, at most once a frame: a point that is dragged many times between two frames
 * costs one plan.
 *
 * @param profile a checked profile; undefined while the draft has problems
 * @param polymer its card, for advice on whether the file was sliced for it
 */
export function useLivePlan(
  layers: readonly PlanLayer[],
  machine: Machine,
  profile: Profile | undefined,
  polymer?: Polymer,
): LivePlan {
  const [live, setLive] = useState<LivePlan>({ plan: undefined, refusal: undefined });
  useEffect(() => {
    if (!profile) return;
    const frame = requestAnimationFrame(() => {
      try {
        const plan = planDuties({ layers, machine, profile, polymer });
        setLive({ plan, refusal: undefined });
      } catch (error) {
        if (!(error instanceof Refusal)) throw error;
        setLive((old) => ({ ...old, refusal: error }));
      }
    });
    return () => cancelAnimationFrame(frame);
  }, [layers, machine, profile, polymer]);
  return live;
}
