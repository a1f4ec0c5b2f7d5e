import { describe, expect, test } from "vitest";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { curve, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

// Thousandths, so that rounding does not hide what a ramp does.
const machine = machineWith({ lamp: { drive: { by: "named-pin", name: "lamp" } } });

function lampPlan(zones: object[], layers: PlanLayer[], rest: object = {}) {
  const plan = planDuties({ layers, machine, profile: profileWith(zones, rest) });
  return { duties: plan.layers.map(({ duty }) => duty.lamp), reasons: plan.layers.map(({ reason }) => reason.lamp) };
}

const BASE = { name: "base", from: 0, to: 1, heating: fixed("lamp", 0.6) };
const LIP = { name: "lip", from: 1, rampMm: 0.6, heating: fixed("lamp", 0.3) };

describe("a zone's ramp", () => {
  test("runs from the lower zone's value at the border to the zone's own over its height", () => {
    const { duties, reasons } = lampPlan([BASE, LIP], layersOf(9));
    expect(duties).toEqual([0.6, 0.6, 0.6, 0.6, 0.6, 0.5, 0.4, 0.3, 0.3]);
    expect(reasons[5]).toEqual(["zone lip: fixed at 0.30", "ramp from zone base: 33 % of 0.6 mm"]);
    expect(reasons[7]).toEqual(["zone lip: fixed at 0.30"]);
  });

  test("asks the lower zone's rule for this very layer", () => {
    const base = {
      ...BASE,
      heating: curve("lamp", "layer-time", [
        [10, 0.6],
        [20, 0.8],
      ]),
    };
    const { duties } = lampPlan(
      [base, LIP],
      layersOf(6, (i) => ({ timeS: i === 5 ? 20 : 10 })),
    );
    expect(duties[5]).toBeCloseTo(0.8 + (0.3 - 0.8) / 3, 3);
  });

  test("reads the lower zone's curve over height at the border, where it ended", () => {
    const base = {
      ...BASE,
      heating: curve("lamp", "height", [
        [0, 0],
        [1, 0.6],
        [2, 1],
      ]),
    };
    expect(lampPlan([base, LIP], layersOf(6)).duties[5]).toBe(0.5);
  });

  test("begins, in layer numbers, at the top of the object's last layer below", () => {
    const zones = [
      { ...BASE, unit: "layer", to: 5 },
      { ...LIP, unit: "layer", from: 5 },
    ];
    const layers = layersOf(9, (i) => ({ zMm: 3 + i * 0.2 }));
    expect(lampPlan(zones, layers).duties).toEqual([0.6, 0.6, 0.6, 0.6, 0.6, 0.5, 0.4, 0.3, 0.3]);
  });

  test("begins, in fractions, at the top of each object's last layer below", () => {
    const zones = [
      { ...BASE, unit: "fraction", to: 0.5 },
      { ...LIP, unit: "fraction", from: 0.5 },
    ];
    const layers = layersOf(12, (i) => ({ object: i < 4 ? 1 : 2, zMm: 0.2 * (i < 4 ? i + 1 : i - 3) }));
    expect(lampPlan(zones, layers).duties).toEqual([0.6, 0.6, 0.5, 0.4, 0.6, 0.6, 0.6, 0.6, 0.5, 0.4, 0.3, 0.3]);
  });

  test("is none in an object that has no layer below the zone", () => {
    const zones = [
      { ...BASE, unit: "layer", to: 2 },
      { ...LIP, unit: "layer", from: 2 },
    ];
    const layers = layersOf(4, (i) => ({ object: i < 2 ? 1 : 2, zMm: 0.2 * ((i % 2) + 1) }));
    expect(lampPlan(zones, layers).duties).toEqual([0.6, 0.6, 0.3, 0.3]);
  });

  test("stays at the lower zone's value where a layer dips below the zone's start", () => {
    const zones = [
      { ...BASE, unit: "layer", to: 2 },
      { ...LIP, unit: "layer", from: 2 },
    ];
    const layers = layersOf(4, (i) => ({ zMm: [0.8, 1, 0.9, 1.2][i] }));
    expect(lampPlan(zones, layers).duties).toEqual([0.6, 0.6, 0.6, 0.5]);
  });

  test("begins where the lower zone's own ramp had come to, so no duty jumps at a ramped border", () => {
    const zones = [
      BASE,
      { ...LIP, to: 1.2, rampMm: 0.4, heating: fixed("lamp", 0.2) },
      { name: "top", from: 1.2, rampMm: 0.4, heating: fixed("lamp", 0.8) },
    ];
    expect(lampPlan(zones, layersOf(8)).duties.slice(4)).toEqual([0.6, 0.4, 0.6, 0.8]);
  });

  test("does not touch the duty of bed layers", () => {
    const zones = [
      { ...BASE, to: 0.2 },
      { ...LIP, from: 0.2 },
    ];
    const { duties } = lampPlan(zones, layersOf(5), { bedLayers: { count: 2, duty: { lamp: 0.9 } } });
    expect(duties).toEqual([0.9, 0.9, 0.4, 0.3, 0.3]);
  });
});

describe("the end ramp", () => {
  const limits = { limits: { lamp: { endRampMm: 1 } } };
  const zones = [{ name: "all", from: 0, heating: fixed("lamp", 0.5) }];

  test("steps the lamp down so that the topmost layer runs at idle", () => {
    const { duties, reasons } = lampPlan(zones, layersOf(7), limits);
    expect(duties).toEqual([0.5, 0.5, 0.4, 0.3, 0.2, 0.1, 0]);
    expect(reasons[3]).toEqual(["zone all: fixed at 0.50", "end ramp over the last 1 mm: 60 % left"]);
  });

  test("ends at the machine's idle duty", () => {
    const idle = machineWith({ lamp: { drive: { by: "named-pin", name: "lamp" }, idleDuty: 0.1 } });
    const plan = planDuties({ layers: layersOf(6), machine: idle, profile: profileWith(zones, limits) });
    expect(plan.layers.map(({ duty }) => duty.lamp)).toEqual([0.5, 0.42, 0.34, 0.26, 0.18, 0.1]);
  });

  test("leaves a duty alone that lies below idle already", () => {
    const idle = machineWith({ lamp: { drive: { by: "named-pin", name: "lamp" }, idleDuty: 0.7 } });
    const plan = planDuties({ layers: layersOf(6), machine: idle, profile: profileWith(zones, limits) });
    expect(plan.layers.map(({ duty }) => duty.lamp)).toEqual([0.5, 0.5, 0.5, 0.5, 0.5, 0.5]);
  });

  test("belongs to the last object only: the ones before are followed by layers that need the lamp", () => {
    const layers = layersOf(12, (i) => ({ object: i < 6 ? 1 : 2, zMm: 0.2 * ((i % 6) + 1) }));
    const { duties } = lampPlan(zones, layers, limits);
    expect(duties).toEqual([0.5, 0.5, 0.5, 0.5, 0.5, 0.5, 0.5, 0.4, 0.3, 0.2, 0.1, 0]);
  });

  test("gives way to the largest change per layer, and advice says so", () => {
    const profile = profileWith(zones, { limits: { lamp: { endRampMm: 1, maxDutyPerLayer: 0.05 } } });
    const plan = planDuties({ layers: layersOf(7), machine, profile });
    expect(plan.layers.map(({ duty }) => duty.lamp)).toEqual([0.5, 0.5, 0.45, 0.4, 0.35, 0.3, 0.25]);
    expect(plan.advice).toEqual([
      {
        layer: 3,
        code: "end-ramp-not-held",
        message:
          "Layers 3–7 (5): lamp cannot keep to its end ramp and is still at 0.25 on layer 7. Make the ramp longer, or the limits of lamp wider.",
      },
    ]);
  });

  test("gives way to a least duty that the profile sets, and advice says so", () => {
    const profile = profileWith(zones, { limits: { lamp: { endRampMm: 1, minDuty: 0.25 } } });
    const plan = planDuties({ layers: layersOf(7), machine, profile });
    expect(plan.layers.map(({ duty }) => duty.lamp)).toEqual([0.5, 0.5, 0.4, 0.3, 0.25, 0.25, 0.25]);
    expect(plan.layers[6].reason.lamp.at(-1)).toBe("raised to at least 0.25");
    expect(plan.advice.map(({ layer, code }) => [layer, code])).toEqual([[5, "end-ramp-not-held"]]);
  });
});
