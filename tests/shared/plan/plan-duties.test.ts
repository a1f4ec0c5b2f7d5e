import { describe, expect, test } from "vitest";
import { parseProfile } from "#shared/formats/profile.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { Refusal } from "#shared/refusal.ts";
import { curve, everywhere, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

function refusalOf(run: () => unknown): Refusal {
  try {
    run();
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

describe("the seal ring with a stiff base and a tough lip", () => {
  const machine = machineWith({
    fan: { minDuty: 0.12, startBoostS: 0.2, settleS: 1.5 },
    lamp: { maxDuty: 0.85, settleS: 2, maxDutyPerS: 0.05 },
  });
  const profile = parseProfile({
    format: "quenchline.profile/1",
    name: "Seal ring, stiff base and tough lip",
    polymer: "PEEK",
    bedLayers: { count: 2, duty: { "part-fan": 0, lamp: 0.4 } },
    zones: [
      {
        name: "base",
        from: 0,
        to: 6,
        unit: "mm",
        target: "semi-crystalline",
        cooling: curve("part-fan", "layer-time", [
          [3, 0.55],
          [10, 0.3],
          [40, 0.12],
        ]),
        heating: fixed("lamp", 0.62),
      },
      {
        name: "lip",
        from: 6,
        unit: "mm",
        target: "amorphous",
        rampMm: 0.6,
        cooling: curve("part-fan", "deposited-length", [
          [100, 0.8],
          [600, 0.45],
          [3000, 0.2],
        ]),
        heating: curve("lamp", "height", [
          [6, 0.2],
          [30, 0.28],
        ]),
      },
    ],
    limits: { "part-fan": { maxDutyPerLayer: 0.15 }, lamp: { maxDutyPerLayer: 0.1, endRampMm: 2 } },
    lead: { "part-fan": 0, lamp: "settle" },
  });
  const { layers, advice } = planDuties({ layers: layersOf(60), machine, profile });
  const reasonsOf = (index: number) => layers[index - 1].reason;

  test("begins with its bed layers and comes up to the rules as fast as its limits let it", () => {
    expect(layers.slice(0, 5).map(({ duty }) => Math.round(duty["part-fan"] * 255))).toEqual([0, 0, 38, 76, 77]);
    expect(layers.slice(0, 6).map(({ duty }) => Math.round(duty.lamp * 255))).toEqual([102, 102, 127, 152, 158, 158]);
    expect(reasonsOf(1)).toEqual({
      "part-fan": ["zone base: curve over layer time at 10 s → 0.30", "bed layer 1 of 2: 0.00"],
      lamp: ["zone base: fixed at 0.62", "bed layer 1 of 2: 0.40"],
    });
    expect(reasonsOf(3)).toEqual({
      "part-fan": [
        "zone base: curve over layer time at 10 s → 0.30",
        "change limited to 0.15 a layer",
        "rounded to 38/255",
      ],
      lamp: ["zone base: fixed at 0.62", "change limited to 0.10 a layer", "rounded to 127/255"],
    });
  });

  test("ramps from the base to the lip, as far as the largest change lets it", () => {
    expect(layers[29].duty.lamp).toBe(158 / 255);
    expect(reasonsOf(31).lamp).toEqual([
      "zone lip: curve over height at 6.2 mm → 0.201",
      "ramp from zone base: 33 % of 0.6 mm",
      "change limited to 0.10 a layer",
      "rounded to 133/255",
    ]);
    expect(reasonsOf(31)["part-fan"].slice(0, 2)).toEqual([
      "zone lip: curve over deposited length at 500 mm → 0.52",
      "ramp from zone base: 33 % of 0.6 mm",
    ]);
    expect(layers[31].duty["part-fan"]).toBe(114 / 255);
  });

  test("steps the lamp down over its last two millimetres", () => {
    expect(layers[49].duty.lamp).toBe(54 / 255);
    expect(layers[54].duty.lamp).toBe(28 / 255);
    expect(reasonsOf(55).lamp[1]).toBe("end ramp over the last 2 mm: 50 % left");
    expect(layers[59].duty.lamp).toBe(0);
  });

  test("comes with advice where a limit keeps a layer from its rule", () => {
    expect(advice.map(({ layer, code }) => [layer, code])).toEqual([
      [3, "change-limited"],
      [3, "change-limited"],
      [32, "change-limited"],
    ]);
  });
});

test("channels that the profile does not drive are left out of the plan", () => {
  const plan = planDuties({
    layers: layersOf(1),
    machine: machineWith(),
    profile: profileWith(everywhere([], fixed("lamp", 0.5))),
  });
  expect(Object.keys(plan.layers[0].duty)).toEqual(["lamp"]);
  expect(Object.keys(plan.layers[0].reason)).toEqual(["lamp"]);
});

test("several fans follow rules of their own", () => {
  const side = { id: "side-fan", kind: "fan", drive: { by: "named-fan", name: "side" } };
  const plan = planDuties({
    layers: layersOf(1),
    machine: machineWith({ more: [side] }),
    profile: profileWith(everywhere([fixed("side-fan", 0.321), fixed("part-fan", 0.4)])),
  });
  expect(plan.layers[0].duty).toEqual({ "part-fan": 0.4, "side-fan": 0.321 });
});

test("a print without layers has an empty plan", () => {
  const profile = profileWith(everywhere(fixed("part-fan", 0.5)));
  expect(planDuties({ layers: [], machine: machineWith(), profile })).toEqual({
    format: "quenchline.plan/1",
    layers: [],
    advice: [],
  });
});

test("the largest change holds across objects printed one after the other", () => {
  const profile = profileWith(everywhere([], fixed("lamp", 0.8)), {
    bedLayers: { count: 1, duty: { lamp: 0.2 } },
    limits: { lamp: { maxDutyPerLayer: 0.2 } },
  });
  const layers = layersOf(6, (i) => ({ object: i < 4 ? 1 : 2, zMm: 0.2 * (i < 4 ? i + 1 : i - 3) }));
  const plan = planDuties({ layers, machine: machineWith(), profile });
  expect(plan.layers.map(({ duty }) => duty.lamp)).toEqual([0.2, 0.4, 0.6, 0.8, 0.6, 0.8]);
});

test("a rule that holds asks for the polymer's card", () => {
  const profile = profileWith([
    { name: "all", from: 0, target: "amorphous", heating: { channel: "lamp", rule: "hold" } },
  ]);
  const refusal = refusalOf(() => planDuties({ layers: layersOf(1), machine: machineWith(), profile }));
  expect(refusal.code).toBe("polymer-missing");
});

test("a profile that does not fit the machine is refused", () => {
  const profile = profileWith(everywhere(fixed("chamber-fan", 0.5)));
  const refusal = refusalOf(() => planDuties({ layers: layersOf(1), machine: machineWith(), profile }));
  expect(refusal.code).toBe("unknown-channel");
});
