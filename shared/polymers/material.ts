import type { Polymer } from "#shared/formats/polymer.ts";
import type { Margins } from "#shared/formats/profile.ts";
import type { Range } from "#shared/formats/thermal.ts";
import { fitHalfTimes } from "#shared/polymers/fit-half-times.ts";

/** A polymer card's numbers alone, in the units of the model. */
export interface Material {
  name: string;
  tgC: number;
  /** null: nothing of it crystallises */
  tmC: number | null;
  solidBelowC: number;
  /** null: crystals alone do not hold the shape */
  solidAtRelativeCrystallinity: number | null;
  weldAboveC: number;
  amorphousReachable: boolean;
  densityKgM3: number;
  heatCapacityJKgK: number;
  conductivityWMK: number;
  emissivity: number;
  lampAbsorptivity: Range;
  /** null: an amorphous polymer */
  kinetics: Kinetics | null;
}

/** How a polymer crystallises: a bell of rate over temperature, cut off at Tg and Tm. */
export interface Kinetics {
  tgC: number;
  tmC: number;
  heatOfFusionJKg: number;
  /** absolute crystallinity reached in the end, 0-1 */
  attainable: number;
  avramiN: number;
  /** fastest rate constant, (ln 2)^(1/n) over the shortest half-time, 1/s */
  fastestPerS: number;
  fastestAtC: number;
  /** half the width of the bell at half its height, K */
  halfWidthC: number;
}

/**
 * The numbers of a card. Where it has half-times of the team's own, the bell is fitted to them and the one written down
 * stays aside.
 *
 * @throws Refusal `half-times-unusable` where no bell fits them
 */
export function materialOf(card: Polymer): Material {
  const { lampAbsorptivity: lamp } = card;
  return {
    name: card.variant === "" ? card.name : `${card.name} ${card.variant}`,
    tgC: card.tgC.value,
    tmC: card.tmC?.value ?? null,
    solidBelowC: card.solidBelowC.value,
    solidAtRelativeCrystallinity: card.solidAtRelativeCrystallinity?.value ?? null,
    weldAboveC: card.weldAboveC.value,
    amorphousReachable: card.amorphousReachable,
    densityKgM3: card.densityKgM3.value,
    heatCapacityJKgK: card.heatCapacityJKgK.value,
    conductivityWMK: card.conductivityWMK.value,
    emissivity: card.emissivity.value,
    lampAbsorptivity: { low: lamp.low.value, typical: lamp.typical.value, high: lamp.high.value },
    kinetics: kineticsOf(card),
  };
}

/** The card's margins, those of a profile laid over them. */
export function marginsOf({ margins }: Polymer, own: Margins = {}): Required<Margins> {
  return {
    belowTgC: own.belowTgC ?? margins.belowTgC.value,
    aboveTgC: own.aboveTgC ?? margins.aboveTgC.value,
    maxCrystallinity: own.maxCrystallinity ?? margins.maxCrystallinity.value,
    minCrystallinity: own.minCrystallinity ?? margins.minCrystallinity.value,
  };
}

function kineticsOf({ tgC, tmC, crystallinity }: Polymer): Kinetics | null {
  if (crystallinity === null || tmC === undefined) return null;
  const { halfTimes } = crystallinity;
  const between = { tgC: tgC.value, tmC: tmC.value };
  const bell =
    halfTimes === undefined
      ? {
          fastestPerS: crystallinity.fastestPerS.value,
          fastestAtC: crystallinity.fastestAtC.value,
          halfWidthC: crystallinity.halfWidthC.value,
        }
      : fitHalfTimes(halfTimes.points, crystallinity.avramiN.value, between);
  return {
    ...between,
    ...bell,
    heatOfFusionJKg: crystallinity.heatOfFusionJG.value * 1_000,
    attainable: crystallinity.attainable.value,
    avramiN: crystallinity.avramiN.value,
  };
}
