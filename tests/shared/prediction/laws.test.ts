import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { startMarch } from "#shared/prediction/march.ts";
import { makeModel, type PredictionLayer } from "#shared/prediction/model.ts";
import { duties, layersOf, machineWith, polymerWith } from "#tests/shared/prediction/parts.ts";

const COUNT = 24;
const share = fc.double({ min: 0, max: 1, noNaN: true });
const part = fc.record({
  timeS: fc.double({ min: 1, max: 90, noNaN: true }),
  areaMm2: fc.double({ min: 5, max: 5_000, noNaN: true }),
  heightMm: fc.double({ min: 0.05, max: 0.4, noNaN: true }),
});
/** Steps are the same on both sides, so what differs is the law and not the error: below this, temperatures are equal. */
const EQUAL_C = 1e-6;

function interlayers(each: Partial<PredictionLayer>, fan: number, lamp: number, thermal: object = {}) {
  const layers = layersOf(COUNT, () => ({ outlineMm: 3 * Math.sqrt(each.areaMm2 ?? 100), ...each }));
  const machine = machineWith(
    { surroundings: { riseAtFullLampC: 20, lagS: 120 }, ...thermal },
    { fan: { settleS: 1.5 }, lamp: { settleS: 2 } },
  );
  const model = makeModel({ layers, machine, polymer: polymerWith(), exotherm: false, coarsen: false });
  return startMarch(model, duties(COUNT, fan, lamp)).run().interlayerC;
}

const neverColder = (warmer: Float64Array, than: Float64Array) =>
  warmer.forEach((tempC, p) => {
    expect(tempC).toBeGreaterThanOrEqual(than[p] - EQUAL_C);
  });

describe("whatever the part", () => {
  test("more lamp never makes a layer colder", () => {
    fc.assert(
      fc.property(part, share, share, share, (each, fan, one, other) => {
        neverColder(interlayers(each, fan, Math.max(one, other)), interlayers(each, fan, Math.min(one, other)));
      }),
      { numRuns: 60 },
    );
  });

  test("more fan never makes a layer hotter, while it is hotter than the air", () => {
    fc.assert(
      fc.property(part, share, share, share, (each, lamp, one, other) => {
        neverColder(interlayers(each, Math.min(one, other), lamp), interlayers(each, Math.max(one, other), lamp));
      }),
      { numRuns: 60 },
    );
  });

  test("warmer air never makes a layer colder", () => {
    fc.assert(
      fc.property(part, share, share, fc.double({ min: 0, max: 100, noNaN: true }), (each, fan, lamp, riseC) => {
        neverColder(
          interlayers(each, fan, lamp, { roomAirC: 20 + riseC }),
          interlayers(each, fan, lamp, { roomAirC: 20 }),
        );
      }),
      { numRuns: 40 },
    );
  });

  test("a longer layer is never hotter when it is covered, with equal duties and the lamp weak", () => {
    fc.assert(
      fc.property(part, share, fc.double({ min: 1, max: 3, noNaN: true }), (each, fan, factor) => {
        // A bed as warm as the air: on a hot bed, time may also warm.
        const cool = { ...each, bedC: 40 };
        const shorter = interlayers(cool, fan, 0);
        const longer = interlayers({ ...cool, timeS: each.timeS * factor }, fan, 0);
        // Different times are stepped differently, which shows by some tenths.
        longer.forEach((tempC, p) => {
          expect(tempC).toBeLessThanOrEqual(shorter[p] + 0.6);
        });
      }),
      { numRuns: 60 },
    );
  });
});

const odd = fc.constantFrom(0, -1, Number.NaN, Number.POSITIVE_INFINITY, 1e-9, 1, 50);
const anyLayer = fc.record({
  timeS: fc.constantFrom(0, 1e-3, 1, 20, 5_000, Number.NaN, -1),
  areaMm2: odd,
  outlineMm: odd,
  heightMm: fc.constantFrom(0, 0.01, 0.05, 0.2, 1, Number.NaN),
  zMm: fc.constantFrom(0.2, 50, Number.NaN),
  nozzleC: fc.constantFrom(null, 0, 390, 450),
  bedC: fc.constantFrom(null, 0, 140, 250),
  object: fc.constantFrom(1, 1, 1, 2),
});

test("whatever stands in a layer, every result is a number within reason", () => {
  const machine = machineWith({}, { fan: { settleS: 0.1 }, lamp: { settleS: 600 } });
  fc.assert(
    fc.property(fc.array(anyLayer, { minLength: 1, maxLength: 15 }), odd, odd, (given, fan, lamp) => {
      const layers = layersOf(given.length, (i) => given[i]);
      const results = startMarch(
        makeModel({ layers, machine, polymer: polymerWith() }),
        duties(given.length, fan, lamp),
      ).run();
      for (let p = 0; p < given.length; p++) {
        expect(results.interlayerC[p]).toBeGreaterThan(0);
        expect(results.interlayerC[p]).toBeLessThan(700);
        expect(results.crystallinity[p]).toBeGreaterThanOrEqual(0);
        expect(results.crystallinity[p]).toBeLessThanOrEqual(0.35);
        expect(results.timeAboveTgS[p]).toBeGreaterThanOrEqual(0);
        expect(results.contactC[p]).toBeLessThan(700);
      }
    }),
    { numRuns: 150 },
  );
});

test("10,000 layers of 1 s and 0.05 mm come to an end, with no more nodes than a hundred or so", () => {
  const layers = layersOf(10_000, () => ({ timeS: 1, heightMm: 0.05 }));
  const march = startMarch(
    makeModel({ layers, machine: machineWith(), polymer: polymerWith() }),
    duties(10_000, 0.3, 0.4),
  );
  while (march.next < 10_000) march.layer();
  expect(march.column.count).toBeLessThan(130);
  march.finish();
  expect(march.results.interlayerC.every(Number.isFinite)).toBe(true);
});
