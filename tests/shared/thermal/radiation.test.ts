import { describe, expect, test } from "vitest";
import { stepColumn } from "#shared/thermal/step-column.ts";
import { lump, settle, substance, surround } from "#tests/shared/thermal/columns.ts";

/** Heavy, so that a step does not change its temperature. */
const heavy = (emissivity: number) => substance({ densityKgM3: 1e9, heatCapacityJKgK: 1e3, emissivity });
const onePiece = { volumeM3: 1, surfaceM2: 1 };

describe("R1, radiative coefficient of a black body", () => {
  test.each([
    [200, 25, 13.679],
    [300, 25, 20.622],
    [143, 25, 10.615],
    [400, 25, 29.853],
    [400, 200, 44.005],
  ])("%d to %d °C: %d W/m²K", (tempC, aroundC, coefficient) => {
    const column = lump(heavy(1), { ...onePiece, tempC });
    surround(column, { gasC: aroundC });
    stepColumn(column, 1);
    expect(column.heat.radiatedJ / (tempC - aroundC)).toBeCloseTo(coefficient, 2);
  });
});

test("R2, Incropera example 1.2: bare steam pipe of 70 mm, 200 °C in 25 °C: 998 W/m", () => {
  const column = lump(heavy(0.8), { volumeM3: 1, surfaceM2: Math.PI * 0.07, tempC: 200 });
  surround(column, { h: 15, gasC: 25 });
  stepColumn(column, 1);
  expect(Math.abs(column.heat.toAirJ + column.heat.radiatedJ - 998)).toBeLessThan(1);
});

describe("R3, Incropera example 1.7: coating under a lamp of 2000 W/m², absorptivity 0.8, emissivity 0.5, walls of 30 °C", () => {
  const cured = (h: number) => {
    const column = lump(substance({ densityKgM3: 1000, heatCapacityJKgK: 1000, emissivity: 0.5 }), {
      volumeM3: 1e-3,
      surfaceM2: 1,
      tempC: 20,
    });
    surround(column, { h, gasC: 20, wallsC: 30, topWM2: 0.8 * 2000 });
    settle(column, 0.5);
    return column.tempC[0];
  };
  test("104 °C with h 15", () => expect(cured(15)).toBeCloseTo(104.3, 1));
  test("50 °C with h 51", () => expect(cured(51.0)).toBeCloseTo(50, 1));
});

describe("R10, absorbed flux that holds a temperature, emissivity 0.95, 25 °C all round (derived)", () => {
  test.each([
    [1369, 10, 100],
    [2370, 10, 143],
    [4730, 30, 143],
    [6496, 30, 180],
    [7524, 30, 200],
  ])("%d W/m² at h %d: %d °C", (topWM2, h, tempC) => {
    const column = lump(substance({ densityKgM3: 1000, heatCapacityJKgK: 1000, emissivity: 0.95 }), {
      volumeM3: 1e-3,
      surfaceM2: 1,
      tempC: 25,
    });
    surround(column, { h, gasC: 25, topWM2 });
    settle(column, 0.5);
    expect(Math.abs(column.tempC[0] - tempC)).toBeLessThan(0.1);
  });
});
