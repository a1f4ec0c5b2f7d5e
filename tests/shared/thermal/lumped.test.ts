import { describe, expect, test } from "vitest";
import { type Around, lump, run, settle, substance, surround, timeUntil } from "#tests/shared/thermal/columns.ts";

const sphere = (dM: number) => ({ volumeM3: (Math.PI * dM ** 3) / 6, surfaceM2: Math.PI * dM ** 2 });
/** Both faces of a plate, and a long rod, by 1 m² and 1 m. */
const plate = (thickM: number) => ({ volumeM3: thickM, surfaceM2: 2 });
const rod = (dM: number) => ({ volumeM3: (Math.PI * dM ** 2) / 4, surfaceM2: Math.PI * dM });

const body = (
  numbers: Parameters<typeof substance>[0],
  shape: { volumeM3: number; surfaceM2: number },
  tempC: number,
  around: Around,
) => {
  const column = lump(substance(numbers), { ...shape, tempC });
  surround(column, around);
  return column;
};

/** Incropera, DeWitt, Bergman, Lavine, Fundamentals of Heat and Mass Transfer, 6th ed.; answers recomputed from its inputs. */
describe("one node is a lumped body", () => {
  const bead = { densityKgM3: 8500, heatCapacityJKgK: 400, conductivityWMK: 20 };
  /** 6 h tau / (rho c) with tau 1 s */
  const beadD = 7.06e-4;

  test("H1, example 5.1: thermocouple bead from 25 to 199 °C in gas of 200 °C: 5.2 s", () => {
    const column = body(bead, sphere((6 * 400) / (8500 * 400)), 25, { h: 400, gasC: 200 });
    expect((6 * 400) / (8500 * 400)).toBeCloseTo(beadD, 6);
    expect(timeUntil(column, 0, 199, 0.02)).toBeCloseTo(5.165, 2);
  });

  test("H2, example 5.2: the same bead radiating to walls of 400 °C: 218.7 °C, within 1 °C after 4.9 s", () => {
    const around = { h: 400, gasC: 200, wallsC: 400 };
    const steady = body({ ...bead, emissivity: 0.9 }, sphere(beadD), 25, around);
    settle(steady, 0.01);
    expect(steady.tempC[0]).toBeCloseTo(218.71, 1);
    const column = body({ ...bead, emissivity: 0.9 }, sphere(beadD), 25, around);
    expect(timeUntil(column, 0, 217.71, 0.02)).toBeCloseTo(4.985, 1);
  });

  test("H3, example 5.3: coated panel, heated by air and walls, cured for 5 min, cooled: 124 s, 175 °C, 989 s", () => {
    const panel = { densityKgM3: 2770, heatCapacityJKgK: 875, conductivityWMK: 177, emissivity: 0.8 };
    const column = body(panel, plate(3e-3), 25, { h: 40, gasC: 175 });
    const heatedS = timeUntil(column, 0, 150, 0.5);
    expect(Math.abs(heatedS - 123.1)).toBeLessThan(0.5);
    run(column, 300, 300);
    expect(column.tempC[0]).toBeCloseTo(174.8, 1);
    surround(column, { h: 10, gasC: 25 });
    expect(Math.abs(heatedS + 300 + timeUntil(column, 0, 37, 0.5) - 986)).toBeLessThan(2);
  });

  test("H4, Çengel example 4.1: bead of 1 mm reaches 99 % of a step in 10 s", () => {
    const column = body({ densityKgM3: 8500, heatCapacityJKgK: 320, conductivityWMK: 35 }, sphere(1e-3), 0, {
      h: 210,
      gasC: 100,
    });
    expect(timeUntil(column, 0, 99, 0.02)).toBeCloseTo(9.94, 2);
  });

  test("H5, pychemengg example: plates of 1 cm after 2 min in an oven of 800 °C: 689 °C", () => {
    const column = body({ densityKgM3: 2800, heatCapacityJKgK: 880, conductivityWMK: 180 }, plate(0.01), 20, {
      h: 200,
      gasC: 800,
    });
    run(column, 120, 100);
    expect(column.tempC[0]).toBeCloseTo(688.8, 1);
  });

  test("H6, pychemengg example: copper rod of 2 cm from 100 to 25 °C in air of 20 °C: 238 s", () => {
    const column = body({ densityKgM3: 8933, heatCapacityJKgK: 385, conductivityWMK: 401 }, rod(0.02), 100, {
      h: 200,
      gasC: 20,
    });
    expect(timeUntil(column, 0, 25, 0.5)).toBeCloseTo(238.4, 0);
  });

  test("H7, Incropera example 7.6: copper sphere of 10 mm from 75 to 35 °C in air of 23 °C: 71.6 s", () => {
    const column = body({ densityKgM3: 8933, heatCapacityJKgK: 388, conductivityWMK: 400 }, sphere(0.01), 75, {
      h: 118.3,
      gasC: 23,
    });
    expect(Math.abs(timeUntil(column, 0, 35, 0.2) - 71.6)).toBeLessThan(0.3);
  });
});

describe("H21, a bead of 0.4 x 0.2 mm with three free sides, from 380 °C in air of 25 °C (derived from the closed form)", () => {
  const peek = { densityKgM3: 1300, heatCapacityJKgK: 2100, conductivityWMK: 0.25 };
  const shape = { volumeM3: 0.4e-3 * 0.2e-3, surfaceM2: 0.4e-3 + 2 * 0.2e-3 };
  test.each([
    [10, 30.1, 13],
    [30, 10.0, 39],
    [60, 5.01, 78],
    [100, 3.01, 130],
    [200, 1.5, 260],
  ])("h %d: Tg of 143 °C after %d s, %d K/s at first", (h, toTgS, initialKS) => {
    const column = body(peek, shape, 380, { h, gasC: 25 });
    expect(Math.abs(timeUntil(column, 0, 143, toTgS / 200) - toTgS)).toBeLessThan(0.006 * toTgS);
    const early = body(peek, shape, 380, { h, gasC: 25 });
    run(early, 1e-4, 1);
    expect(Math.abs((380 - early.tempC[0]) / 1e-4 - initialKS)).toBeLessThan(0.6);
  });

  test("in air of 120 °C it takes 66, 22, 11, 6.6 and 3.3 s", () => {
    for (const [h, toTgS] of [
      [10, 66],
      [30, 22],
      [60, 11],
      [100, 6.6],
      [200, 3.3],
    ]) {
      const column = body(peek, shape, 380, { h, gasC: 120 });
      expect(Math.abs(timeUntil(column, 0, 143, toTgS / 300) - toTgS)).toBeLessThan(0.015 * toTgS);
    }
  });

  test("H20: with its whole outline in air, h 60, it cools at 0.32967 of its excess per second", () => {
    const column = body(peek, { volumeM3: 0.4e-3 * 0.2e-3, surfaceM2: 2 * (0.4e-3 + 0.2e-3) }, 380, {
      h: 60,
      gasC: 25,
    });
    run(column, 1, 50);
    expect(-Math.log((column.tempC[0] - 25) / 355)).toBeCloseTo(0.32967, 5);
  });
});
