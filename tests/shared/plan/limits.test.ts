import { describe, expect, test } from "vitest";
import { effectiveLimits } from "#shared/plan/limits.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { curve, everywhere, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

/** Plans one channel for layer times that are its duties in thousandths: the curve is the identity. */
function follow(id: "part-fan" | "lamp", thousandths: number[], machine: object, limits: object = {}) {
  const identity = curve(id, "layer-time", [
    [0, 0],
    [1000, 1],
  ]);
  const drive = { by: id === "lamp" ? "named-pin" : "named-fan", name: "output" };
  const plan = planDuties({
    layers: layersOf(thousandths.length, (i) => ({ timeS: thousandths[i] })),
    machine: machineWith(id === "lamp" ? { lamp: { drive, ...machine } } : { fan: { drive, ...machine } }),
    profile: profileWith(id === "lamp" ? everywhere([], identity) : everywhere(identity), { limits: { [id]: limits } }),
  });
  return {
    duties: plan.layers.map(({ duty }) => Math.round(duty[id] * 1000)),
    reasons: plan.layers.map(({ reason }) => reason[id].slice(1)),
    advice: plan.advice.filter(({ code }) => code !== "layer-time-unknown"),
  };
}

describe("the limits of a channel", () => {
  const machine = machineWith({ fan: { minDuty: 0.1, maxDuty: 0.9 }, lamp: { minDuty: 0.1, maxDutyPerS: 0.05 } });
  const [fan, lamp] = machine.channels;
  const zones = everywhere(fixed("part-fan", 0.5), fixed("lamp", 0.5));

  test("are the machine's where the profile says nothing", () => {
    expect(effectiveLimits(fan, profileWith(zones))).toEqual({
      minDuty: 0.1,
      maxDuty: 0.9,
      mayBeOff: true,
      maxDutyPerLayer: Number.POSITIVE_INFINITY,
      maxDutyPerS: Number.POSITIVE_INFINITY,
      endRampMm: 0,
    });
  });

  test("are the narrower of machine and profile", () => {
    const limits = { "part-fan": { minDuty: 0.2, maxDuty: 0.8 }, lamp: { maxDutyPerS: 0.01, endRampMm: 2 } };
    expect(effectiveLimits(fan, profileWith(zones, { limits }))).toMatchObject({ minDuty: 0.2, maxDuty: 0.8 });
    expect(effectiveLimits(lamp, profileWith(zones, { limits }))).toMatchObject({ maxDutyPerS: 0.01, endRampMm: 2 });
  });

  test("never widen the machine's", () => {
    const limits = { "part-fan": { minDuty: 0, maxDuty: 1 } };
    expect(effectiveLimits(fan, profileWith(zones, { limits }))).toMatchObject({ minDuty: 0.1, maxDuty: 0.9 });
  });

  test("let a heater be off unless the profile sets its least duty", () => {
    expect(effectiveLimits(lamp, profileWith(zones)).mayBeOff).toBe(true);
    expect(effectiveLimits(lamp, profileWith(zones, { limits: { lamp: { minDuty: 0.2 } } })).mayBeOff).toBe(false);
  });

  test("may keep a channel off altogether", () => {
    const off = profileWith(zones, { limits: { "part-fan": { maxDuty: 0 } } });
    expect(effectiveLimits(fan, off)).toMatchObject({ minDuty: 0, maxDuty: 0 });
    const plan = planDuties({ layers: layersOf(2), machine, profile: off });
    expect(plan.layers.map(({ duty }) => duty["part-fan"])).toEqual([0, 0]);
  });

  test("are refused where they leave no duty", () => {
    const profile = profileWith(zones, { limits: { "part-fan": { minDuty: 0.95 } } });
    expect(() => effectiveLimits(fan, profile)).toThrow("leave part-fan no duty: at least 0.95 and at most 0.9");
  });

  test("are refused where the drive has no step between them", () => {
    const profile = profileWith(zones, { limits: { "part-fan": { minDuty: 0.5, maxDuty: 0.5 } } });
    expect(() => planDuties({ layers: layersOf(1), machine, profile })).toThrow("none lies between 0.5 and 0.5");
  });
});

describe("highest and lowest duty", () => {
  test("a duty above the highest is limited to it", () => {
    const { duties, reasons } = follow("lamp", [840, 860, 1000], { maxDuty: 0.85 });
    expect(duties).toEqual([840, 850, 850]);
    expect(reasons).toEqual([[], ["limited to at most 0.85"], ["limited to at most 0.85"]]);
  });

  test("rounding never passes the highest duty", () => {
    const machine = machineWith({ lamp: { maxDuty: 0.85 } });
    const profile = profileWith(everywhere([], fixed("lamp", 0.85)));
    const [layer] = planDuties({ layers: layersOf(1), machine, profile }).layers;
    expect(layer.duty.lamp).toBe(216 / 255);
    expect(layer.reason.lamp.at(-1)).toBe("rounded to 216/255");
  });

  test("below its least duty a fan is off or at the least duty, whichever is nearer", () => {
    const { duties, reasons } = follow("part-fan", [0, 1, 59, 60, 119, 120, 121], { minDuty: 0.12 });
    expect(duties).toEqual([0, 0, 0, 120, 120, 120, 121]);
    expect(reasons[2]).toEqual(["below the fan's dead band of 0.12: off"]);
    expect(reasons[3]).toEqual(["below the fan's dead band of 0.12: raised to 0.12"]);
    expect(reasons[0]).toEqual([]);
  });

  test("the profile may widen a fan's dead band, and off stays off", () => {
    expect(follow("part-fan", [0, 120, 160, 300], { minDuty: 0.12 }, { minDuty: 0.3 }).duties).toEqual([
      0, 0, 300, 300,
    ]);
  });

  test("a heater below the machine's least duty gets that, and off stays off", () => {
    const { duties, reasons } = follow("lamp", [0, 10, 100], { minDuty: 0.1 });
    expect(duties).toEqual([0, 100, 100]);
    expect(reasons[1]).toEqual(["raised to at least 0.10"]);
  });

  test("a heater that the profile gives a least duty is never off", () => {
    expect(follow("lamp", [0, 200], {}, { minDuty: 0.15 }).duties).toEqual([150, 200]);
  });
});

describe("the largest change per layer", () => {
  test("holds from the layer before in print order, up and down; the first layer is free", () => {
    const { duties, reasons } = follow("lamp", [500, 900, 900, 900, 200, 200], {}, { maxDutyPerLayer: 0.15 });
    expect(duties).toEqual([500, 650, 800, 900, 750, 600]);
    expect(reasons[1]).toEqual(["change limited to 0.15 a layer"]);
    expect(reasons[3]).toEqual([]);
  });

  test("is not passed by rounding", () => {
    const machine = machineWith();
    const profile = profileWith(
      everywhere(
        [],
        curve("lamp", "height", [
          [0.2, 0],
          [0.4, 1],
        ]),
      ),
      { limits: { lamp: { maxDutyPerLayer: 0.15 } } },
    );
    const plan = planDuties({ layers: layersOf(4), machine, profile });
    expect(plan.layers.map(({ duty }) => Math.round(duty.lamp * 255))).toEqual([0, 38, 76, 114]);
    expect(plan.layers[1].reason.lamp.slice(1)).toEqual(["change limited to 0.15 a layer", "rounded to 38/255"]);
  });

  test("is not passed by rounding on the way down either", () => {
    const zones = [
      { name: "low", from: 0, to: 0.2, heating: fixed("lamp", 0.8) },
      { name: "high", from: 0.2, heating: fixed("lamp", 0) },
    ];
    const profile = profileWith(zones, { limits: { lamp: { maxDutyPerLayer: 0.03 } } });
    const plan = planDuties({ layers: layersOf(3), machine: machineWith(), profile });
    expect(plan.layers.map(({ duty }) => Math.round(duty.lamp * 255))).toEqual([204, 197, 190]);
  });

  test("is not named where a fan only goes from off to its least duty, as its rule says", () => {
    const zones = [
      { name: "low", from: 0, to: 0.2, cooling: fixed("part-fan", 0) },
      { name: "high", from: 0.2, cooling: fixed("part-fan", 0.12) },
    ];
    const profile = profileWith(zones, { limits: { "part-fan": { maxDutyPerLayer: 0.03 } } });
    const plan = planDuties({ layers: layersOf(2), machine: machineWith({ fan: { minDuty: 0.12 } }), profile });
    expect(plan.layers[1].reason["part-fan"]).toEqual(["zone high: fixed at 0.12", "rounded to 31/255"]);
  });

  test("does not keep a fan off: it may go to its least duty at once, but no further", () => {
    const { duties, reasons } = follow("part-fan", [0, 500, 500], { minDuty: 0.12 }, { maxDutyPerLayer: 0.05 });
    expect(duties).toEqual([0, 120, 170]);
    expect(reasons[1]).toEqual(["change limited to 0.05 a layer, past the dead band to 0.12"]);
  });

  test("brings a fan down to its least duty before it goes off", () => {
    const { duties, reasons } = follow("part-fan", [200, 0, 0, 0], { minDuty: 0.12 }, { maxDutyPerLayer: 0.05 });
    expect(duties).toEqual([200, 150, 120, 0]);
    expect(reasons[2]).toEqual(["change limited to 0.05 a layer, held at 0.12 before off"]);
    expect(reasons[3]).toEqual([]);
  });

  test("that is larger than the dead band goes over it without stopping", () => {
    expect(follow("part-fan", [0, 500, 0, 0, 0], { minDuty: 0.12 }, { maxDutyPerLayer: 0.2 }).duties).toEqual([
      0, 200, 0, 0, 0,
    ]);
  });
});
