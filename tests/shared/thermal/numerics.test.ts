import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { materialOf } from "#shared/polymers/material.ts";
import { Column } from "#shared/thermal/column.ts";
import { stepColumn } from "#shared/thermal/step-column.ts";
import { polymerWith } from "#tests/shared/prediction/parts.ts";
import { run, substance, surround } from "#tests/shared/thermal/columns.ts";

function stack(nodes: number, latent: boolean, tempC: (i: number) => number): Column {
  const column = new Column(materialOf(polymerWith({ emissivity: 0.9 })), { bedContactM2KW: 1e-3, latent });
  for (let layer = 0; layer < nodes; layer++) {
    const wide = 1e-4 * (1 + 0.4 * Math.sin(layer));
    column.add({ layer, areaM2: wide, heightM: 2e-4, outlineM: 0.1, tempC: tempC(layer), airC: 40 });
  }
  column.bedC = 140;
  column.hWM2K = 25;
  column.topFluxWM2 = 3000;
  column.sideFluxWM2 = 1500;
  return column;
}

describe("halving the step", () => {
  /** Observed order between two halvings of the step. */
  const order = (latent: boolean, steps: number) => {
    const reached = (n: number) => {
      const column = stack(5, latent, (i) => 180 + 20 * i);
      run(column, 3, n);
      return column.tempC[2];
    };
    const exact = reached(40 * steps);
    return Math.log2(Math.abs(reached(steps) - exact) / Math.abs(reached(2 * steps) - exact));
  };
  test("divides the error of temperature by eight where nothing crystallises", () => {
    expect(order(false, 64)).toBeGreaterThan(2.7);
  });
  test("divides it by four or more where crystallising warms", () => {
    expect(order(true, 256)).toBeGreaterThan(1.7);
  });
});

const anyStep = fc.record({
  dtS: fc.double({ min: 1e-3, max: 300, noNaN: true }),
  h: fc.double({ min: 0, max: 150, noNaN: true }),
  flux: fc.double({ min: 0, max: 9_000, noNaN: true }),
});

describe("heat", () => {
  test("that is booked as come and gone is the change of what is there, to a part in a million", () => {
    fc.assert(
      fc.property(fc.array(anyStep, { minLength: 3, maxLength: 25 }), fc.boolean(), (steps, latent) => {
        const column = stack(9, latent, (i) => 120 + 25 * i);
        let layer = 9;
        for (const { dtS, h, flux } of steps) {
          column.hWM2K = h;
          column.topFluxWM2 = flux;
          column.sideFluxWM2 = flux / 3;
          stepColumn(column, dtS);
          if (layer % 3 === 0) column.merge(1);
          column.add({ layer: layer++, areaM2: 1e-4, heightM: 2e-4, outlineM: 0.1, tempC: 390, airC: 40 });
        }
        const { depositedJ, fromBedJ, fromLampJ, fromCrystallisingJ, toAirJ, radiatedJ } = column.heat;
        const balance = depositedJ + fromBedJ + fromLampJ + fromCrystallisingJ - toAirJ - radiatedJ;
        expect(Math.abs(balance - column.contentJ())).toBeLessThan(1e-6 * column.contentJ());
      }),
    );
  });

  test("is booked as fluxes are: a fine march and a sum over it agree", () => {
    const column = stack(5, false, () => 250);
    let airJ = 0;
    for (let s = 0; s < 4_000; s++) {
      let lossW = 0;
      for (let i = 0; i < 5; i++) lossW += (column.sideM2[i] + column.topM2[i]) * 25 * (column.tempC[i] - 40);
      stepColumn(column, 1e-3);
      let nextW = 0;
      for (let i = 0; i < 5; i++) nextW += (column.sideM2[i] + column.topM2[i]) * 25 * (column.tempC[i] - 40);
      airJ += ((lossW + nextW) / 2) * 1e-3;
    }
    expect(column.heat.toAirJ / airJ).toBeCloseTo(1, 6);
  });
});

test("what is fast dies out however long the step: no overshoot below the coldest around", () => {
  const column = new Column(substance({ densityKgM3: 1280, heatCapacityJKgK: 1700, conductivityWMK: 0.25 }), {
    bedContactM2KW: 1e-3,
    latent: false,
  });
  for (let layer = 0; layer < 30; layer++)
    column.add({ layer, areaM2: 1e-4, heightM: 5e-5, outlineM: 0.1, tempC: layer === 29 ? 400 : 100, airC: 20 });
  surround(column, { h: 100, gasC: 20 });
  column.bedC = 20;
  stepColumn(column, 3_600);
  for (let i = 0; i < 30; i++) {
    expect(column.tempC[i]).toBeGreaterThan(5);
    expect(column.tempC[i]).toBeLessThan(40);
  }
});

describe("above Tm", () => {
  const molten = (surplusC: number) => {
    const column = stack(1, true, () => 343 + surplusC);
    column.relative[0] = 1;
    column.keepCrystals(0, 0.8);
    const stays: number[] = [];
    column.onMelt = (_, share) => stays.push(share);
    surround(column, { h: 0, gasC: 343 });
    column.bedLinkWK = 0;
    stepColumn(column, 1e-6);
    return { column, stays };
  };

  test("crystals melt as far as the heat above it reaches, and hold the temperature at Tm", () => {
    const { column, stays } = molten(5);
    expect(stays).toHaveLength(1);
    expect(column.tempC[0]).toBeCloseTo(343, 3);
    const meltedJ = 5 * column.capacityJK[0];
    expect(column.relative[0]).toBeCloseTo(0.8 - meltedJ / column.latentJ[0], 3);
  });

  test("all of them where it reaches far enough", () => {
    const { column, stays } = molten(100);
    expect(stays[0]).toBe(0);
    expect(column.relative[0]).toBe(0);
    expect(column.integral[0]).toBe(0);
    // 0.8 of 0.35 of 130 kJ/kg over 1700 J/(kg K)
    expect(column.tempC[0]).toBeCloseTo(443 - (0.8 * 0.35 * 130e3) / 1700, 1);
  });
});
