import type { Polymer } from "#shared/formats/polymer.ts";
import { newPolymer } from "#src/features/polymers/new-polymer.ts";

/** Changes of a card that are more than one number. Each returns a new card. */

/** Of an amorphous polymer nothing crystallises: it has no Tm, and amorphous is always within reach. */
export function crystallising(polymer: Polymer, crystallises: boolean): Polymer {
  const { tmC, solidAtRelativeCrystallinity: _, ...rest } = polymer;
  if (!crystallises) return { ...rest, amorphousReachable: true, crystallinity: null };
  const { tmC: placeholder, crystallinity } = newPolymer();
  return { ...rest, tmC: tmC ?? placeholder, crystallinity };
}

/** Whether crystals alone hold a layer's shape, with a placeholder to begin from. */
export function solidByCrystals(polymer: Polymer, held: boolean): Polymer {
  const { solidAtRelativeCrystallinity, ...rest } = polymer;
  if (!held) return rest;
  return {
    ...rest,
    solidAtRelativeCrystallinity: solidAtRelativeCrystallinity ?? newPolymer().solidAtRelativeCrystallinity,
  };
}
