import { relativeCrystallinity } from "#shared/crystallinity/avrami.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import { materialOf } from "#shared/polymers/material.ts";
import { layerSteps } from "#shared/prediction/steps.ts";
import { coarsen } from "#shared/thermal/coarsen.ts";
import { Column } from "#shared/thermal/column.ts";
import { stepColumn } from "#shared/thermal/step-column.ts";
import { type End, type Surroundings, surroundingsOf } from "#shared/thermal/surroundings.ts";

/** A layer, and that the part consists of such layers. */
export interface LeverMapLayer {
  timeS: number;
  heightMm: number;
  areaMm2: number;
  outlineMm: number;
  nozzleC: number;
}

export interface LeverMapInput {
  machine: Machine;
  polymer: Polymer;
  layer: LeverMapLayer;
  /** channels of the two levers */
  fan: string;
  lamp: string;
  /** duties to try, rising, 0-1 */
  fanDuties: readonly number[];
  lampDuties: readonly number[];
  /** duties of the machine's other channels; left out: off */
  others?: Readonly<Record<string, number>>;
  end?: End;
}

/** By lamp, then fan: entry [lamp * fanDuties.length + fan]. */
export interface LeverMap {
  interlayerC: Float64Array;
  /** absolute, of a layer that others have been laid on */
  crystallinity: Float64Array;
}

/** A layer is followed until so many lie on it, and no heat passes below them. */
const WINDOW = 40;
/** From one pair of duties to the next so many layers are laid at most; the state is steady when a layer changes nothing. */
const MOST_LAYERS = 18;
const STEADY_C = 0.02;

/**
 * What fan and lamp together do to a layer deep in a part of such layers, far from the bed, once everything repeats with
 * every layer: the same column as the prediction's, each pair of duties going on from the pair beside it.
 */
export function leverMap({ machine, polymer, layer, fan, lamp, ...rest }: LeverMapInput): LeverMap {
  const { fanDuties, lampDuties, others = {}, end = "typical" } = rest;
  const material = materialOf(polymer);
  const surroundings = surroundingsOf(machine, material, end);
  const column = new Column(material, { bedContactM2KW: Number.POSITIVE_INFINITY, latent: true });
  column.wallsC = surroundings.wallsC;
  const map = {
    interlayerC: new Float64Array(fanDuties.length * lampDuties.length),
    crystallinity: new Float64Array(fanDuties.length * lampDuties.length),
  };
  const attainable = material.kinetics?.attainable ?? 0;
  const lay = () => layOne(column, layer, surroundings.roomAirC);
  lampDuties.forEach((lampDuty, l) => {
    for (let step = 0; step < fanDuties.length; step++) {
      // To and fro, so that neighbours in time are neighbours on the map.
      const f = l % 2 === 0 ? step : fanDuties.length - 1 - step;
      setLevers(column, surroundings, { ...others, [fan]: fanDuties[f], [lamp]: lampDuty });
      let count = column.count === 0 ? -WINDOW : 0;
      let before = Number.NaN;
      let interlayerC = lay();
      while (count++ < MOST_LAYERS && !(Math.abs(interlayerC - before) < STEADY_C)) {
        before = interlayerC;
        interlayerC = lay();
      }
      const at = l * fanDuties.length + f;
      map.interlayerC[at] = interlayerC;
      map.crystallinity[at] = attainable * relativeCrystallinity(gainOfOneLayer(column), column.avramiN);
    }
  });
  return map;
}

/** @returns interlayer temperature, °C */
function layOne(column: Column, layer: LeverMapLayer, airC: number): number {
  const { timeS, heightMm, areaMm2, outlineMm, nozzleC } = layer;
  coarsen(column, () => {});
  let layers = 0;
  for (let i = 0; i < column.count; i++) {
    layers += column.layers[i];
    column.gained[i] = 0;
  }
  if (layers >= WINDOW) column.dropLowest();
  const slice = { layer: 0, areaM2: areaMm2 / 1e6, heightM: heightMm / 1e3, outlineM: outlineMm / 1e3 };
  column.add({ ...slice, tempC: nozzleC, airC });
  const steps = layerSteps(timeS, slice.heightM, column.material);
  for (let s = 0, dtS = steps.firstS; s < steps.count; s++, dtS *= steps.growth) stepColumn(column, dtS);
  return column.tempC[column.count - 1];
}

/** Where every layer goes through the same, what all nodes gain during one layer is what one layer gains during all. */
function gainOfOneLayer({ count, gained, layers }: Column): number {
  let sum = 0;
  for (let i = 0; i < count; i++) sum += gained[i] * layers[i];
  return sum;
}

/** Lags are over in the steady state, and the air is as warm as the lamps make it. */
function setLevers(column: Column, surroundings: Surroundings, duties: Readonly<Record<string, number>>): void {
  const { fans, lamps, h0WM2K, airRiseC } = surroundings;
  const dutyOf = (id: string) => Math.min(1, Math.max(0, duties[id] ?? 0));
  column.hWM2K = fans.reduce((h, { id, h1WM2K, exponent }) => h + h1WM2K * dutyOf(id) ** exponent, h0WM2K);
  let fluxWM2 = 0;
  let sideWM2 = 0;
  let fullWM2 = 0;
  for (const { id, absorbedWM2, sideShare, exponent } of lamps) {
    const lightWM2 = absorbedWM2 * dutyOf(id) ** exponent;
    fluxWM2 += lightWM2;
    sideWM2 += lightWM2 * sideShare;
    fullWM2 += absorbedWM2;
  }
  column.topFluxWM2 = fluxWM2;
  column.sideFluxWM2 = sideWM2;
  column.airRiseC = fullWM2 > 0 ? (airRiseC * fluxWM2) / fullWM2 : 0;
}
