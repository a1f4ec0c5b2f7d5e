import { checkFit } from "#shared/formats/fit.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import { holds, type Profile } from "#shared/formats/profile.ts";
import { planHold } from "#shared/plan/hold/plan-hold.ts";
import { layDuties } from "#shared/plan/lay-duties.ts";
import { materialAdvice } from "#shared/plan/material-advice.ts";
import type { Plan, PlanLayer } from "#shared/plan/plan.ts";
import { Refusal } from "#shared/refusal.ts";

/** What a plan is made from. */
export interface PlanInput {
  /** in print order */
  layers: readonly PlanLayer[];
  machine: Machine;
  profile: Profile;
  /** the card of what is printed; a profile with a rule that holds needs it */
  polymer?: Polymer;
}

/**
 * Plans the duty of every channel that the profile drives, for every layer, with the reason for each: the zone's rule,
 * then bed layers, zone ramp and end ramp, then lowest and highest duty and the fan's dead band, then the largest change
 * from the layer before, then rounding to a step of the drive. Motion is never changed; what fan and heater cannot put
 * right is advice. The same input gives the same plan.
 *
 * The largest change per second is not applied here: it is a matter of how a change is written. Where it needs more
 * time than there is, advice says so.
 *
 * @throws Refusal `zone-missing` for a layer outside all zones, `limits-conflict` where machine and profile leave a
 * channel no duty, `polymer-missing` where a rule holds and no card is given, and those of `checkFit`
 */
export function planDuties({ layers, machine, profile, polymer }: PlanInput): Plan {
  checkFit(machine, profile, polymer);
  const plan = planOf({ layers, machine, profile, polymer });
  const advice = polymer ? materialAdvice(layers, polymer) : [];
  return { ...plan, advice: [...advice, ...plan.advice].sort((a, b) => a.layer - b.layer) };
}

function planOf({ layers, machine, profile, polymer }: PlanInput): Plan {
  if (!holds(profile)) return layDuties(layers, machine, profile, nothingHeld);
  if (polymer === undefined)
    throw new Refusal(
      "polymer-missing",
      `The profile "${profile.name}" holds layers on a state, which needs the card of ${profile.polymer}.`,
      `Give the polymer's card as well.`,
    );
  return planHold({ layers, machine, profile, polymer });
}

/** A profile without a rule that holds never asks. */
const nothingHeld = (channel: string): never => {
  throw new Error(`nothing was solved for ${channel}`);
};
