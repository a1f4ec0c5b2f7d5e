import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { type PlanInput, planDuties } from "#shared/plan/plan-duties.ts";
import { curve, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

const duty = fc.integer({ min: 0, max: 100 }).map((n) => n / 100);

/** Times and lengths as they come, and as they should not. */
const quantity = fc.oneof(
  fc.double({ min: 0, max: 4000 }),
  fc.constantFrom(0, -1, Number.NaN, Number.POSITIVE_INFINITY),
);

const curvePoints = fc
  .uniqueArray(fc.tuple(fc.integer({ min: 0, max: 4000 }), duty), { selector: ([x]) => x, minLength: 1, maxLength: 5 })
  .map((points) => points.sort(([a], [b]) => a - b));

const rule = (id: string) =>
  fc.oneof(
    duty.map((value) => fixed(id, value)),
    fc
      .tuple(fc.constantFrom("layer-time", "deposited-length", "height"), curvePoints)
      .map(([over, points]) => curve(id, over, points)),
  );

/** One to four zones on top of each other, in any of the units, that together cover every layer. */
const zones = fc
  .tuple(
    fc.constantFrom("mm", "layer", "fraction"),
    fc.array(fc.record({ cooling: rule("part-fan"), heating: rule("lamp"), rampMm: fc.constantFrom(0, 0.3, 1, 5) }), {
      minLength: 1,
      maxLength: 4,
    }),
  )
  .map(([unit, list]) => {
    const border = (z: number) => (unit === "fraction" ? z / list.length : unit === "mm" ? z * 1.3 : z * 5);
    return list.map((zone, z) => ({
      ...zone,
      name: `zone ${z}`,
      unit,
      from: border(z),
      to: z === list.length - 1 ? undefined : border(z + 1),
    }));
  });

const limits = fc.record(
  { maxDuty: fc.constantFrom(0.5, 0.77, 1), maxDutyPerLayer: fc.constantFrom(0.001, 0.02, 0.03, 0.1, 0.35) },
  { requiredKeys: [] },
);

const layers = fc
  .array(
    fc.record({
      timeS: quantity,
      depositedLengthMm: quantity,
      zStepMm: fc.constantFrom(0.1, 0.2, 0.35),
      next: fc.nat(9),
    }),
    { minLength: 1, maxLength: 40 },
  )
  .map((list): PlanLayer[] => {
    let object = 1;
    let zMm = 0;
    return list.map(({ timeS, depositedLengthMm, zStepMm, next }, i) => {
      if (next === 0 && i > 0) {
        object++;
        zMm = 0;
      }
      zMm += zStepMm;
      return { index: i + 1, object, zMm, heightMm: zStepMm, timeS, depositedLengthMm };
    });
  });

/** Anything that fits together. */
const task: fc.Arbitrary<PlanInput> = fc
  .record({
    layers,
    zones,
    fanMin: fc.constantFrom(0, 0.12, 0.3),
    lampMin: fc.constantFrom(0, 0.05),
    steps: fc.constantFrom(255, 1),
    fan: limits,
    lamp: limits,
    endRampMm: fc.constantFrom(0, 0.5, 3),
    bedLayers: fc.record({ count: fc.nat(3), duty: fc.record({ "part-fan": duty, lamp: duty }) }),
  })
  .map(({ layers, zones, fanMin, lampMin, steps, fan, lamp, endRampMm, bedLayers }) => ({
    layers,
    machine: machineWith({
      fan: { minDuty: fanMin, maxDuty: 0.95, drive: { by: "fan-index", index: 0, fullScale: steps } },
      lamp: { minDuty: lampMin, maxDuty: 0.85, drive: { by: "pin", pin: 4, fullScale: steps } },
    }),
    profile: profileWith(zones, {
      bedLayers,
      limits: { "part-fan": narrow(fan, 0.95), lamp: { ...narrow(lamp, 0.85), endRampMm } },
    }),
  }));

function narrow(given: { maxDuty?: number }, machineMax: number) {
  return { ...given, maxDuty: Math.min(given.maxDuty ?? 1, machineMax) };
}

/** The limits of a task's channel, worked out without the planner. */
function limitsOf({ machine, profile }: PlanInput, id: string) {
  const channel = machine.channels.find((candidate) => candidate.id === id)!;
  const steps = "fullScale" in channel.drive && channel.drive.fullScale === 255 ? 255 : 1000;
  const { maxDuty = 1, maxDutyPerLayer = 2 } = profile.limits[id];
  return { steps, min: channel.minDuty, max: maxDuty, perLayer: maxDutyPerLayer };
}

const CHANNELS = ["part-fan", "lamp"];
const CLOSE = 1e-9;

describe("whatever the profile, the machine and the toolpath", () => {
  test("every duty is a step of its drive, and off or within the limits", () =>
    fc.assert(
      fc.property(task, (input) => {
        const { layers } = planDuties(input);
        for (const id of CHANNELS) {
          const { steps, min, max } = limitsOf(input, id);
          for (const { duty } of layers) {
            expect(duty[id]).toBe(Math.round(duty[id] * steps) / steps);
            expect(duty[id]).toBeLessThanOrEqual(max + CLOSE);
            if (duty[id] !== 0) expect(duty[id]).toBeGreaterThanOrEqual(min - CLOSE);
          }
        }
      }),
    ));

  test("no duty changes by more than its limit from one layer to the next, but to cross the dead band", () =>
    fc.assert(
      fc.property(task, (input) => {
        const { layers } = planDuties(input);
        for (const id of CHANNELS) {
          const { steps, min, perLayer } = limitsOf(input, id);
          const least = Math.ceil(min * steps - CLOSE) / steps;
          for (let i = 1; i < layers.length; i++) {
            const [before, after] = [layers[i - 1].duty[id], layers[i].duty[id]];
            const crosses = before === 0 || after === 0;
            const most = crosses ? Math.max(perLayer, least) : perLayer;
            expect(Math.abs(after - before)).toBeLessThanOrEqual(most + CLOSE);
          }
        }
      }),
    ));

  test("every duty has its reasons, and every layer of the toolpath its duties", () =>
    fc.assert(
      fc.property(task, (input) => {
        const plan = planDuties(input);
        expect(plan.layers.map(({ index }) => index)).toEqual(input.layers.map(({ index }) => index));
        for (const { duty, reason } of plan.layers) {
          expect(Object.keys(duty)).toEqual(CHANNELS);
          for (const id of CHANNELS) {
            expect(reason[id].length).toBeGreaterThan(0);
            expect(reason[id].join()).not.toMatch(/NaN|undefined/);
          }
        }
      }),
    ));

  test("advice names layers of the toolpath, in their order, in whole sentences", () =>
    fc.assert(
      fc.property(task, (input) => {
        const { advice } = planDuties(input);
        expect(advice.map(({ layer }) => layer)).toEqual(advice.map(({ layer }) => layer).sort((a, b) => a - b));
        for (const { layer, message } of advice) {
          expect(input.layers[layer - 1].index).toBe(layer);
          expect(message).toMatch(/^Layers? [\d–() ]+: .*\.$/);
          expect(message).not.toMatch(/NaN|undefined/);
        }
      }),
    ));

  test("the same input gives the same plan, and is left as it was", () =>
    fc.assert(
      fc.property(task, (input) => {
        const before = structuredClone(input);
        expect(planDuties(input)).toEqual(planDuties(structuredClone(input)));
        expect(input).toEqual(before);
      }),
    ));
});

test("splitting a zone into two of the same kind changes no duty", () =>
  fc.assert(
    fc.property(task, fc.integer({ min: 1, max: 9 }), (input, tenth) => {
      const { profile } = input;
      const last = profile.zones.length - 1;
      const zone = profile.zones[last];
      const height = { mm: 0.25, layer: 1, fraction: 0.1 / (last + 1) }[zone.unit];
      const border = zone.from + tenth * height;
      // A border inside the ramp would ramp no further: the upper half has none of its own.
      const whole = { ...profile, zones: [...profile.zones.slice(0, last), { ...zone, rampMm: 0 }] };
      const halves = [
        { ...zone, rampMm: 0, to: border },
        { ...zone, rampMm: 0, from: border },
      ];
      const split = { ...profile, zones: [...profile.zones.slice(0, last), ...halves] };
      const dutiesOf = (p: typeof profile) => planDuties({ ...input, profile: p }).layers.map(({ duty }) => duty);
      expect(dutiesOf(split)).toEqual(dutiesOf(whole));
    }),
  ));

test("a ramp between two fixed duties only ever goes from the one towards the other", () =>
  fc.assert(
    fc.property(duty, duty, fc.integer({ min: 1, max: 40 }), (low, high, tenths) => {
      const profile = profileWith([
        { name: "low", from: 0, to: 1, heating: fixed("lamp", low) },
        { name: "high", from: 1, rampMm: tenths / 10, heating: fixed("lamp", high) },
      ]);
      const { layers } = planDuties({ layers: layersOf(40), machine: machineWith(), profile });
      const duties = layers.map((layer) => layer.duty.lamp);
      const direction = Math.sign(high - low);
      for (let i = 1; i < duties.length; i++) expect((duties[i] - duties[i - 1]) * direction).toBeGreaterThanOrEqual(0);
      expect(duties[4]).toBe(Math.round(low * 255 + CLOSE) / 255);
      expect(duties[39]).toBe(Math.round(high * 255 + CLOSE) / 255);
    }),
  ));

test("the lamp only ever goes down over its end ramp", () =>
  fc.assert(
    fc.property(duty, fc.integer({ min: 1, max: 60 }), (value, tenths) => {
      const profile = profileWith([{ name: "all", from: 0, heating: fixed("lamp", value) }], {
        limits: { lamp: { endRampMm: tenths / 10 } },
      });
      const { layers } = planDuties({ layers: layersOf(30), machine: machineWith(), profile });
      for (let i = 1; i < layers.length; i++) {
        expect(layers[i].duty.lamp).toBeLessThanOrEqual(layers[i - 1].duty.lamp);
      }
      expect(layers[29].duty.lamp).toBe(0);
    }),
  ));
