import type { Material } from "#shared/polymers/material.ts";
import { Column } from "#shared/thermal/column.ts";
import { KELVIN, stepColumn } from "#shared/thermal/step-column.ts";

/** Any material that does not crystallise; black where not said otherwise is a matter of each example. */
export function substance(numbers: Partial<Material>): Material {
  return {
    name: "test",
    tgC: 1e4,
    tmC: null,
    solidBelowC: 0,
    solidAtRelativeCrystallinity: null,
    weldAboveC: 0,
    amorphousReachable: true,
    densityKgM3: 1,
    heatCapacityJKgK: 1,
    conductivityWMK: 1,
    emissivity: 0,
    lampAbsorptivity: { low: 1, typical: 1, high: 1 },
    kinetics: null,
    ...numbers,
  };
}

/** The constant of textbook answers is rounded to 5.67e-8: a part in 15,000. */
export interface Around {
  h?: number;
  gasC: number;
  wallsC?: number;
  topWM2?: number;
}

/** A body of one temperature: one node without a bed. */
export function lump(
  material: Material,
  { volumeM3, surfaceM2, tempC }: { volumeM3: number; surfaceM2: number; tempC: number },
) {
  const column = new Column(material, { bedContactM2KW: Number.POSITIVE_INFINITY, latent: false });
  const areaM2 = surfaceM2 / 2;
  const heightM = volumeM3 / areaM2;
  column.add({ layer: 0, areaM2, heightM, outlineM: areaM2 / heightM, tempC, airC: 0 });
  return column;
}

export function surround(column: Column, { h = 0, gasC, wallsC, topWM2 = 0 }: Around): void {
  for (let i = 0; i < column.count; i++) column.airC[i] = gasC;
  column.hWM2K = h;
  column.wallsC = wallsC ?? null;
  column.topFluxWM2 = topWM2;
  column.sideFluxWM2 = topWM2;
}

/** Goes on until a node has passed a temperature, at the longest for `mostS`; the last step is shared out evenly. */
export function timeUntil(column: Column, node: number, targetC: number, dtS: number, mostS = 1e5): number {
  let nowS = 0;
  while (nowS < mostS) {
    const before = column.tempC[node];
    stepColumn(column, dtS);
    const now = column.tempC[node];
    if ((before - targetC) * (now - targetC) <= 0) return nowS + (dtS * (targetC - before)) / (now - before);
    nowS += dtS;
  }
  throw new Error(`never ${targetC} °C`);
}

export function run(column: Column, timeS: number, steps: number): void {
  for (let s = 0; s < steps; s++) stepColumn(column, timeS / steps);
}

/** Steps that grow from a first one until the column has long been steady. */
export function settle(column: Column, firstS: number): void {
  for (let s = 0, dtS = firstS; s < 120; s++, dtS *= 1.15) stepColumn(column, dtS);
}

export const kelvin = (tempC: number): number => tempC + KELVIN;
