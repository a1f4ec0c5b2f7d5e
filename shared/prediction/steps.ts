import type { Material } from "#shared/polymers/material.ts";

/** Steps through a layer's time: small while the fresh layer shares its heat, then growing. */
export interface Steps {
  count: number;
  firstS: number;
  growth: number;
}

/**
 * The first step as a share of the time in which heat crosses the layer, b²·ρ·cp/k, and how much longer each next one
 * is. Both were chosen by comparison with steps so small that they no longer matter; smaller ones cost time in proportion.
 */
const FIRST_SHARE = 0.4;
const GROWTH = 1.5;
/** A layer shorter than so many crossings ends while heat still runs, and sees its last step: its steps grow less. */
const SHORT_CROSSINGS = 40;
const SHORT_GROWTH = 1.3;
const COOLING_GROWTH = 1.3;
const LONGEST_COOLING_S = 60;

/** Steps that add up to a layer's time. */
export function layerSteps(timeS: number, heightM: number, material: Material): Steps {
  if (!(timeS > 0)) return { count: 0, firstS: 0, growth: GROWTH };
  const crossing = crossingS(heightM, material);
  const firstS = FIRST_SHARE * crossing;
  const growth = timeS < SHORT_CROSSINGS * crossing ? SHORT_GROWTH : GROWTH;
  const count = Math.max(1, Math.ceil(Math.log1p(((growth - 1) * timeS) / firstS) / Math.log(growth)));
  return { count, firstS: (timeS * (growth - 1)) / (growth ** count - 1), growth };
}

/** How many layers deep the heat of a fresh layer shows within its time: further than this, a step for the whole layer is exact to 0.1 K. */
export function reachInLayers(timeS: number, heightM: number, material: Material): number {
  return 8 + 7 * Math.sqrt(timeS / crossingS(heightM, material));
}

/** Steps for the time after the print, until it is enough for the one who takes them. */
export function* coolingSteps(heightM: number, material: Material, mostS: number): Generator<number> {
  let dtS = FIRST_SHARE * crossingS(heightM, material);
  for (let nowS = 0; nowS < mostS; nowS += dtS) {
    yield dtS;
    dtS = Math.min(dtS * COOLING_GROWTH, LONGEST_COOLING_S);
  }
}

/** Time in which heat crosses a layer, b²·ρ·cp/k, s. */
export function crossingS(heightM: number, { densityKgM3, heatCapacityJKgK, conductivityWMK }: Material): number {
  return (heightM ** 2 * densityKgM3 * heatCapacityJKgK) / conductivityWMK;
}
