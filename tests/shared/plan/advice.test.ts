import { describe, expect, test } from "vitest";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { curve, everywhere, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

const overTime = (first: number) =>
  curve("part-fan", "layer-time", [
    [3, first],
    [10, 0.3],
  ]);

function adviceFor(zones: object[], layers: PlanLayer[], machine = machineWith(), rest: object = {}) {
  return planDuties({ layers, machine, profile: profileWith(zones, rest) }).advice;
}

test("a print that its profile fits gets no advice", () => {
  const zones = everywhere(overTime(1), fixed("lamp", 0.5));
  expect(
    adviceFor(
      zones,
      layersOf(50, (i) => ({ timeS: 3 + i })),
    ),
  ).toEqual([]);
});

describe("layers that are too short", () => {
  const times = [5, 2.54, 2.1, 5, 1];
  const layers = layersOf(5, (i) => ({ timeS: times[i] }));

  test("are named, a run at a time, with the time they need, where the fan can do no more", () => {
    expect(adviceFor(everywhere(overTime(1)), layers)).toEqual([
      {
        layer: 2,
        code: "layer-too-short",
        message:
          "Layers 2–3 (2): layer time down to 2.1 s, below the first point (3 s) of the curve in zone all, and part-fan is at its limit of 1.00. Print more parts at once, or slow these layers down to at least 3 s.",
      },
      {
        layer: 5,
        code: "layer-too-short",
        message:
          "Layer 5: layer time down to 1 s, below the first point (3 s) of the curve in zone all, and part-fan is at its limit of 1.00. Print more parts at once, or slow the layer down to at least 3 s.",
      },
    ]);
  });

  test("are named as outside the curve, where the fan could do more", () => {
    const [advice] = adviceFor(everywhere(overTime(0.55)), layers);
    expect(advice).toEqual({
      layer: 2,
      code: "below-curve",
      message:
        "Layers 2–3 (2): layer time down to 2.1 s, below the first point (3 s) of the curve in zone all; part-fan is held at 0.55. If shorter layers need more cooling, give the curve a point for them.",
    });
  });

  test("count by deposited length too", () => {
    const rule = curve("part-fan", "deposited-length", [
      [600, 1],
      [900, 0.2],
    ]);
    const [advice] = adviceFor(everywhere(rule), layersOf(3));
    expect(advice.code).toBe("layer-too-short");
    expect(advice.message).toContain("deposited length down to 500 mm, below the first point (600 mm)");
    expect(advice.message).toMatch(/slow these layers down\.$/);
  });

  test("are not named among bed layers, which do not follow the curve", () => {
    const bedLayers = { count: 5, duty: { "part-fan": 0 } };
    expect(adviceFor(everywhere(overTime(1)), layers, machineWith(), { bedLayers })).toEqual([]);
  });
});

test("a run of layers ends with its zone, whose curve the message names", () => {
  const zones = [
    { name: "low", from: 0, to: 0.4, cooling: overTime(1) },
    { name: "high", from: 0.4, cooling: curve("part-fan", "layer-time", [[4, 1]]) },
  ];
  const advice = adviceFor(
    zones,
    layersOf(4, () => ({ timeS: 2 })),
  );
  expect(advice.map(({ layer, message }) => [layer, message.match(/first point \((.*) s\)/)?.[1]])).toEqual([
    [1, "3"],
    [3, "4"],
  ]);
});

test("heights above the last point of a curve over height are named", () => {
  const rule = curve("lamp", "height", [
    [0.1, 0.2],
    [0.6, 0.28],
  ]);
  expect(adviceFor(everywhere([], rule), layersOf(5))).toEqual([
    {
      layer: 4,
      code: "above-curve",
      message:
        "Layers 4–5 (2): heights up to 1 mm lie above the last point (0.6 mm) of the curve in zone all; lamp is held at 0.28.",
    },
  ]);
});

test("a channel that would need more than its limit is named", () => {
  const machine = machineWith({ lamp: { maxDuty: 0.85 } });
  expect(adviceFor(everywhere([], fixed("lamp", 0.9)), layersOf(3), machine)).toEqual([
    {
      layer: 1,
      code: "saturated",
      message: "Layers 1–3 (3): the profile asks for up to 0.90 of lamp, which may have at most 0.85.",
    },
  ]);
});

test("a fan in its dead band is named", () => {
  const machine = machineWith({ fan: { minDuty: 0.12 } });
  expect(adviceFor(everywhere(fixed("part-fan", 0.07)), layersOf(3), machine)).toEqual([
    {
      layer: 1,
      code: "dead-band",
      message:
        "Layers 1–3 (3): the profile asks part-fan for 0.07, where it stalls; below 0.12 it is planned off or at 0.12, whichever is nearer.",
    },
  ]);
});

describe("the largest change per layer", () => {
  const zones = [
    { name: "low", from: 0, to: 0.2, heating: fixed("lamp", 0) },
    { name: "high", from: 0.2, heating: fixed("lamp", 0.51) },
  ];

  test("is named where it keeps a layer more than 0.05 from its rule", () => {
    const advice = adviceFor(zones, layersOf(7), machineWith(), { limits: { lamp: { maxDutyPerLayer: 0.12 } } });
    expect(advice).toEqual([
      {
        layer: 2,
        code: "change-limited",
        message: "Layers 2–4 (3): the largest change of 0.12 a layer keeps lamp up to 0.392 away from its rule.",
      },
    ]);
  });

  test("is named where it is less than a step of the drive", () => {
    const limits = { lamp: { maxDutyPerLayer: 0.003 } };
    const [advice] = adviceFor(zones, layersOf(7), machineWith(), { limits });
    expect(advice.code).toBe("change-below-step");
    expect(advice.message).toContain("0.003 a layer is less than one step (1/255) of lamp");
  });
});

describe("the largest change per second", () => {
  const machine = machineWith({ lamp: { maxDutyPerS: 0.05 }, fan: { minDuty: 0.2, maxDutyPerS: 0.05 } });
  const step = [
    { name: "low", from: 0, to: 0.4, heating: fixed("lamp", 0.2), cooling: fixed("part-fan", 0) },
    { name: "high", from: 0.4, heating: fixed("lamp", 0.4), cooling: fixed("part-fan", 0.2) },
  ];

  test("is named where a change takes longer than the layer below lasts, the jump over the dead band apart", () => {
    const advice = adviceFor(
      step,
      layersOf(4, () => ({ timeS: 3.9 })),
      machine,
    );
    expect(advice).toEqual([
      {
        layer: 3,
        code: "rate-too-slow",
        message: "Layer 3: the change of lamp takes 4 s at 0.05 a second, longer than the layer below lasts.",
      },
    ]);
  });

  test("is not named where the layer below lasts long enough", () => {
    expect(
      adviceFor(
        step,
        layersOf(4, () => ({ timeS: 4 })),
        machine,
      ),
    ).toEqual([]);
  });
});
