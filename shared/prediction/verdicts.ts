import type { Verdicts } from "#shared/formats/prediction.ts";
import type { Margins } from "#shared/formats/profile.ts";
import type { Material } from "#shared/polymers/material.ts";

/** What is wanted of a layer; `between`: a state between the two, about which nothing is said here. */
export type WantedState = "amorphous" | "semi-crystalline" | "none" | "between";

/** What a march found out about one layer. */
export interface LayerFacts {
  /** °C */
  contactC: number;
  /** NaN: not solid before it was covered, s */
  timeToSolidS: number;
  /** absolute, 0-1 */
  crystallinity: number;
  /** of the hot and cold run too; equal to `crystallinity` where there is no band */
  lowCrystallinity: number;
  highCrystallinity: number;
}

/**
 * Answers for one layer.
 *
 * The state goes by the crystallinity that is left when all is cold, so it counts what layers above have reheated. An
 * interlayer temperature on the right side of Tg is the working window for it and no proof.
 */
export function verdictsOf(
  facts: LayerFacts,
  wanted: WantedState,
  material: Material,
  margins: Required<Margins>,
): Verdicts {
  const { crystallinity, lowCrystallinity, highCrystallinity, contactC, timeToSolidS } = facts;
  const { maxCrystallinity, minCrystallinity } = margins;
  const state =
    crystallinity <= maxCrystallinity
      ? "amorphous"
      : crystallinity >= minCrystallinity
        ? "semi-crystalline"
        : "undecided";
  let reaches: Verdicts["reaches"] = null;
  if (wanted === "amorphous")
    reaches = answer(highCrystallinity <= maxCrystallinity, lowCrystallinity <= maxCrystallinity);
  if (wanted === "semi-crystalline")
    reaches = answer(lowCrystallinity >= minCrystallinity, highCrystallinity >= minCrystallinity);
  return { state, reaches, solid: !Number.isNaN(timeToSolidS), welds: contactC >= material.weldAboveC };
}

function answer(overWholeBand: boolean, somewhere: boolean): Verdicts["reaches"] {
  return overWholeBand ? "yes" : somewhere ? "within the band" : "no";
}
