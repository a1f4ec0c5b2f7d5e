import { describe, expect, test } from "vitest";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { Refusal } from "#shared/refusal.ts";
import { fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

const LOW = { name: "low", cooling: fixed("part-fan", 0.2) };
const HIGH = { name: "high", cooling: fixed("part-fan", 0.8) };

/** "l" for a layer in the low zone, "h" for one in the high zone. */
function zonesOf(zones: object[], layers: PlanLayer[]): string {
  const plan = planDuties({ layers, machine: machineWith(), profile: profileWith(zones) });
  return plan.layers.map(({ reason }) => reason["part-fan"][0].slice("zone ".length)[0]).join("");
}

function refusalOf(zones: object[], layers: PlanLayer[]): Refusal {
  try {
    zonesOf(zones, layers);
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

const at = (...zMm: number[]) => layersOf(zMm.length, (i) => ({ zMm: zMm[i] }));

describe("zones in millimetres", () => {
  const zones = [
    { ...LOW, from: 0, to: 6 },
    { ...HIGH, from: 6 },
  ];

  test("cover the layer whose top lies on the upper border, not the one on the lower", () => {
    expect(zonesOf(zones, at(5.8, 6, 6.2))).toBe("llh");
  });

  test("compare in whole micrometres, so the last digits of a sum do not push a layer over a border", () => {
    expect(zonesOf(zones, at(5.999999999999, 6.000000000001, 6.0004, 6.0006))).toBe("lllh");
  });

  test("start again with every object that is printed after another", () => {
    const layers = layersOf(4, (i) => ({ object: i < 2 ? 1 : 2, zMm: [6, 7][i % 2] }));
    expect(zonesOf(zones, layers)).toBe("lhlh");
  });

  test("reach to the top without limit where the last one has no upper border", () => {
    expect(zonesOf(zones, at(100_000))).toBe("h");
  });
});

describe("zones in layer numbers", () => {
  test.each([0, 1])("cover the first layer whether the first zone begins at 0 or 1 (here %d)", (from) => {
    const zones = [
      { ...LOW, unit: "layer", from, to: 2 },
      { ...HIGH, unit: "layer", from: 2 },
    ];
    expect(zonesOf(zones, layersOf(4))).toBe("llhh");
  });

  test("go on counting through objects", () => {
    const zones = [
      { ...LOW, unit: "layer", from: 0, to: 3 },
      { ...HIGH, unit: "layer", from: 3 },
    ];
    const layers = layersOf(4, (i) => ({ object: i < 2 ? 1 : 2, zMm: 0.2 * ((i % 2) + 1) }));
    expect(zonesOf(zones, layers)).toBe("lllh");
  });
});

describe("zones in fractions", () => {
  const zones = [
    { ...LOW, unit: "fraction", from: 0, to: 0.5 },
    { ...HIGH, unit: "fraction", from: 0.5, to: 1 },
  ];

  test("are fractions of the height of each object's own top", () => {
    const layers = layersOf(6, (i) => ({ object: i < 4 ? 1 : 2, zMm: [1, 2, 3, 4, 10, 20][i] }));
    expect(zonesOf(zones, layers)).toBe("llhhlh");
  });

  test("lay their border in whole micrometres too", () => {
    expect(zonesOf(zones, at(0.1 + 0.2, 0.6))).toBe("lh");
  });
});

describe("a layer outside all zones is refused", () => {
  test("above the last zone, naming layer, height and nearest zone", () => {
    const zones = [
      { ...LOW, from: 0, to: 6 },
      { ...HIGH, from: 6, to: 7 },
    ];
    const refusal = refusalOf(zones, at(6, 7, 7.2));
    expect(refusal.code).toBe("zone-missing");
    expect(refusal.place).toEqual({ layer: 3 });
    expect(refusal.message).toBe(
      'Layer 3 at 7.2 mm lies in no zone of the profile; nearest is zone "high" (6 to 7 mm).',
    );
  });

  test("on the bed's own height", () => {
    const refusal = refusalOf([{ ...LOW, from: 0 }], at(0));
    expect(refusal.code).toBe("zone-missing");
    expect(refusal.message).toContain("(0 to the top mm)");
  });

  test("without a height", () => {
    expect(refusalOf([{ ...LOW, from: 0 }], at(Number.NaN)).message).toContain("Layer 1 has no height");
  });
});
