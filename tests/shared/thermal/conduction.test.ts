import { describe, expect, test } from "vitest";
import type { Material } from "#shared/polymers/material.ts";
import { crossingS } from "#shared/prediction/steps.ts";
import { Column } from "#shared/thermal/column.ts";
import { stepColumn } from "#shared/thermal/step-column.ts";
import { settle, substance, surround } from "#tests/shared/thermal/columns.ts";

/** A slab of 1 m² cut into layers, without sides; `heights` from the bed up. */
function slab(
  material: Material,
  heights: readonly number[],
  tempC: number,
  bedContactM2KW = Number.POSITIVE_INFINITY,
) {
  const column = new Column(material, { bedContactM2KW, latent: false });
  for (const [layer, heightM] of heights.entries())
    column.add({ layer, areaM2: 1, heightM, outlineM: 0, tempC, airC: 0 });
  return column;
}

const even = (count: number, lengthM: number): number[] => Array.from({ length: count }, () => lengthM / count);

/** Temperature of the face above a node from which heat goes over into the gas: half a layer lies between. */
const topFaceC = ({ tempC, count, hWM2K, airC }: Column, k: number, heightM: number) => {
  const halfWM2K = (2 * k) / heightM;
  return (halfWM2K * tempC[count - 1] + hWM2K * airC[count - 1]) / (halfWM2K + hWM2K);
};

/** A material by conductivity and diffusivity alone. */
const byDiffusivity = (conductivityWMK: number, diffusivityM2S: number) =>
  substance({ conductivityWMK, densityKgM3: 1, heatCapacityJKgK: conductivityWMK / diffusivityM2S });

/** Carslaw and Jaeger, Conduction of Heat in Solids: closed forms; examples recomputed from their inputs. */
describe("many nodes are a solid", () => {
  test("H10, convection on a half space (pychemengg, insulating brick): 360 °C after 5 min", () => {
    const material = byDiffusivity(0.17, 1.28e-7);
    const heights = even(400, 0.04);
    const column = slab(material, heights, 25);
    surround(column, { h: 35, gasC: 550 });
    for (let s = 0; s < 600; s++) stepColumn(column, 0.5);
    // The column's top loses heat as if it were as warm as its first tenth of a millimetre.
    expect(Math.abs(topFaceC(column, 0.17, heights[0]) - 359.69)).toBeLessThan(3);
    expect(Math.abs(column.tempC[column.count - 1] - 359.69)).toBeLessThan(0.7);
  });

  test("H11, Incropera example 5.6: frost after 60 days of -15 °C stands at 0.68 m", () => {
    const material = substance({ conductivityWMK: 0.52, densityKgM3: 2050, heatCapacityJKgK: 1840 });
    const heights = even(400, 8);
    const column = slab(material, heights, 20, 0);
    column.bedC = -15;
    for (let s = 0; s < 1_440; s++) stepColumn(column, 3_600);
    let node = 0;
    while (column.tempC[node] < 0) node++;
    const share = -column.tempC[node - 1] / (column.tempC[node] - column.tempC[node - 1]);
    expect((node - 0.5 + share) * heights[0]).toBeCloseTo(0.677, 2);
  });

  test("H12, Incropera example 5.4: wall of 40 mm under oil of 60 °C after 8 min: faces at 43 and 45 °C", () => {
    const material = byDiffusivity(63.9, 18.8e-6);
    const heights = even(100, 0.04);
    const column = slab(material, heights, -20);
    surround(column, { h: 500, gasC: 60 });
    for (let s = 0; s < 960; s++) stepColumn(column, 0.5);
    // The book's one term gives 43.0 and 45.4, eight terms of its series 43.017 and 45.364; our nodes lie 0.2 mm inside.
    expect(Math.abs(column.tempC[0] - 43.017)).toBeLessThan(0.05);
    expect(Math.abs(column.tempC[99] - 45.364)).toBeLessThan(0.05);
  });

  test("two halves brought together meet at the mean of their temperatures", () => {
    const material = byDiffusivity(0.25, 9.16e-8);
    const column = slab(material, even(200, 0.02), 150);
    for (let i = 100; i < 200; i++) column.tempC[i] = 380;
    for (let s = 0; s < 50; s++) stepColumn(column, 0.05);
    expect((column.tempC[99] + column.tempC[100]) / 2).toBeCloseTo(265, 6);
  });

  test("H15: heat crosses 0.2 mm of PEEK in 0.437 s and 1 mm in 10.9 s", () => {
    const peek = substance({ conductivityWMK: 0.25, densityKgM3: 1300, heatCapacityJKgK: 2100 });
    expect(crossingS(2e-4, peek)).toBeCloseTo(0.437, 3);
    expect(crossingS(1e-3, peek)).toBeCloseTo(10.92, 2);
  });
});

interface Fin {
  k: number;
  h: number;
  lengthM: number;
  areaM2: number;
  perimeterM: number;
  baseC: number;
  gasC: number;
}

/** A fin with an adiabatic tip, standing on a base that is held at its temperature; steady. */
function steadyFin({ k, h, lengthM, areaM2, perimeterM, baseC, gasC }: Fin, nodes = 400) {
  const material = substance({ conductivityWMK: k, densityKgM3: 1000, heatCapacityJKgK: 1 });
  const column = new Column(material, { bedContactM2KW: 0, latent: false });
  const heightM = lengthM / nodes;
  for (let layer = 0; layer < nodes; layer++)
    column.add({ layer, areaM2, heightM, outlineM: perimeterM, tempC: gasC, airC: gasC });
  column.topM2[nodes - 1] = 0;
  column.bedC = baseC;
  column.hWM2K = h;
  settle(column, (1000 * lengthM ** 2) / k / 1e4);
  const fromBaseW = column.bedLinkWK * (baseC - column.tempC[0]);
  return { column, fromBaseW };
}

describe("a column with warm ground under it is a fin", () => {
  const round = (dM: number) => ({ areaM2: (Math.PI * dM ** 2) / 4, perimeterM: Math.PI * dM });

  test.each([
    [398, 8.31],
    [180, 5.59],
    [14, 1.56],
  ])("H16, Incropera example 3.9: long rod of 5 mm, k %d: %d W", (k, watts) => {
    const m = Math.sqrt((100 * 4) / (k * 5e-3));
    const { fromBaseW } = steadyFin({ k, h: 100, lengthM: 8 / m, ...round(5e-3), baseC: 100, gasC: 25 });
    expect(Math.abs(fromBaseW - watts)).toBeLessThan(0.01);
  });

  test("H17, Incropera example 3.10: five annular fins give 705 W by Bessel functions (690 W by the book's chart), none 236 W", () => {
    const nodes = 200;
    const [thickM, inner, outer] = [6e-3, 25e-3, 48e-3];
    const column = new Column(substance({ conductivityWMK: 186, densityKgM3: 1000, heatCapacityJKgK: 1 }), {
      bedContactM2KW: 0,
      latent: false,
    });
    const heightM = (outer - inner) / nodes;
    for (let layer = 0; layer < nodes; layer++) {
      const radiusM = inner + (layer + 0.5) * heightM;
      column.add({
        layer,
        areaM2: 2 * Math.PI * radiusM * thickM,
        heightM,
        outlineM: 4 * Math.PI * radiusM,
        tempC: 27,
        airC: 26.85,
      });
      column.topM2[layer] = 0;
      if (layer > 0) column.topM2[layer - 1] = 0;
    }
    column.bedC = 226.85;
    column.hWM2K = 50;
    settle(column, 1e-4);
    const finW = column.bedLinkWK * (column.bedC - column.tempC[0]);
    const bareW = (lengthM: number) => 50 * 2 * Math.PI * inner * lengthM * 200;
    expect(bareW(0.15)).toBeCloseTo(236, 0);
    // The chart's efficiency is read as 0.95; modified Bessel functions give 0.97855.
    expect(Math.abs(5 * finW + bareW(0.15 - 5 * thickM) - 704.66)).toBeLessThan(0.5);
  });

  test("H18, pychemengg: rod of 2 cm, 25 cm long: efficiency 0.2498, 25.1 W", () => {
    const { fromBaseW } = steadyFin({ k: 50, h: 64, lengthM: 0.25, ...round(0.02), baseC: 120, gasC: 20 }, 1_000);
    expect(Math.abs(fromBaseW - 25.116)).toBeLessThan(0.01);
    expect(fromBaseW / (64 * Math.PI * 0.02 * 0.25 * 100)).toBeCloseTo(0.24983, 3);
  });

  test.each([
    [1, 0.93827, 0.90771],
    [2, 0.7978, 0.70058],
    [5, 0.43711, 0.21134],
    [10, 0.22355, 0.02284],
  ])("H19: a wall of 1.2 mm, h 30, %d mm high: efficiency and tip (closed form)", (heightMm, efficiency, tip) => {
    const lengthM = heightMm / 1e3;
    const wall = { k: 0.25, h: 30, lengthM, areaM2: 1.2e-3, perimeterM: 2, baseC: 1, gasC: 0 };
    const { column, fromBaseW } = steadyFin(wall, 400);
    expect(fromBaseW / (30 * 2 * lengthM)).toBeCloseTo(efficiency, 3);
    expect(column.tempC[399]).toBeCloseTo(tip, 3);
  });
});
