import { describe, expect, test } from "vitest";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { interpolate } from "#shared/plan/rules.ts";
import { curve, everywhere, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

function fanPlan(rule: object, layer: Partial<PlanLayer>) {
  const plan = planDuties({
    layers: layersOf(1, () => layer),
    machine: machineWith(),
    profile: profileWith(everywhere(rule)),
  });
  return { duty: plan.layers[0].duty["part-fan"], reason: plan.layers[0].reason["part-fan"], advice: plan.advice };
}

test("a fixed rule gives its duty, rounded to a step of the drive", () => {
  const { duty, reason } = fanPlan(fixed("part-fan", 0.62), {});
  expect(duty).toBe(158 / 255);
  expect(reason).toEqual(["zone all: fixed at 0.62", "rounded to 158/255"]);
});

test("a duty that lies on a step of the drive is not said to be rounded", () => {
  expect(fanPlan(fixed("part-fan", 0.6), {}).reason).toEqual(["zone all: fixed at 0.60"]);
});

describe("a curve", () => {
  const overTime = curve("part-fan", "layer-time", [
    [3, 0.55],
    [10, 0.3],
    [40, 0.12],
  ]);

  test.each([
    [1, 0.55],
    [3, 0.55],
    [6.5, 0.425],
    [10, 0.3],
    [25, 0.21],
    [40, 0.12],
    [400, 0.12],
    [Number.POSITIVE_INFINITY, 0.12],
  ])("over layer time is read between its points and held flat outside: %d s", (timeS, duty) => {
    expect(fanPlan(overTime, { timeS }).duty).toBe(Math.round(duty * 255) / 255);
  });

  test("over layer time says the time and the duty", () => {
    expect(fanPlan(overTime, { timeS: 7.24 }).reason[0]).toBe("zone all: curve over layer time at 7.2 s → 0.399");
  });

  test("over deposited length takes the layer's own length", () => {
    const rule = curve("part-fan", "deposited-length", [
      [100, 0.8],
      [600, 0.4],
    ]);
    const { duty, reason } = fanPlan(rule, { depositedLengthMm: 350 });
    expect(duty).toBe(0.6);
    expect(reason).toEqual(["zone all: curve over deposited length at 350 mm → 0.60"]);
  });

  test("over height takes the layer's top", () => {
    const rule = curve("part-fan", "height", [
      [0, 0],
      [10, 1],
    ]);
    const { duty, reason } = fanPlan(rule, { zMm: 2.000000001, heightMm: 0.4 });
    expect(duty).toBe(0.2);
    expect(reason).toEqual(["zone all: curve over height at 2 mm → 0.20"]);
  });

  test.each([Number.NaN, 0, -1])("over layer time is read at 0 s where the time is %d, and advice says so", (timeS) => {
    const { duty, reason, advice } = fanPlan(overTime, { timeS });
    expect(duty).toBe(Math.round(0.55 * 255) / 255);
    expect(reason[0]).toBe("zone all: curve over layer time at 0 s → 0.55");
    expect(advice.map(({ code }) => code)).toEqual(["layer-time-unknown"]);
  });

  test("with one point is constant", () => {
    expect(interpolate(Float64Array.of(5), Float64Array.of(0.3), 1)).toBe(0.3);
    expect(interpolate(Float64Array.of(5), Float64Array.of(0.3), 9)).toBe(0.3);
  });
});

describe("bed layers", () => {
  const profile = profileWith(everywhere(fixed("part-fan", 0.6), fixed("lamp", 0.2)), {
    bedLayers: { count: 2, duty: { lamp: 0.4 } },
  });

  test("have their own duty, for the channels that are named, and say which they are", () => {
    const { layers } = planDuties({ layers: layersOf(3), machine: machineWith(), profile });
    expect(layers.map(({ duty }) => duty.lamp)).toEqual([0.4, 0.4, 0.2]);
    expect(layers.map(({ duty }) => duty["part-fan"])).toEqual([0.6, 0.6, 0.6]);
    expect(layers[1].reason.lamp).toEqual(["zone all: fixed at 0.20", "bed layer 2 of 2: 0.40"]);
  });

  test("are the first layers of each object, since each stands on the bed", () => {
    const layers = layersOf(6, (i) => ({ object: i < 3 ? 1 : 2, zMm: ((i % 3) + 1) * 0.2 }));
    const plan = planDuties({ layers, machine: machineWith(), profile });
    expect(plan.layers.map(({ duty }) => duty.lamp)).toEqual([0.4, 0.4, 0.2, 0.4, 0.4, 0.2]);
  });
});
