import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { type Polymer, parsePolymer } from "#shared/formats/polymer.ts";
import { type Profile, parseProfile } from "#shared/formats/profile.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import { channelDuties } from "#shared/plan/channel-duties.ts";
import type { Plan, PlanLayer } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { startMarch } from "#shared/prediction/march.ts";
import { makeModel } from "#shared/prediction/model.ts";
import { layersOf } from "#tests/shared/plan/documents.ts";
import { refusalOf } from "#tests/shared/rewrite/tuning.ts";

const json = (name: string) => JSON.parse(readFileSync(new URL(`../../../samples/${name}`, import.meta.url), "utf8"));
const peek = parsePolymer(json("polymers/peek.json"));

/** A machine whose surroundings are known, so that no change of the typical ranges changes these tests. */
function machineWith({ fan = {}, lamp = {} }: { fan?: object; lamp?: object } = {}) {
  const tern = json("machines/tern.json");
  const [partFan, heater] = tern.channels;
  return parseMachine({
    ...tern,
    channels: [
      { ...partFan, minDuty: 0.12, maxDuty: 1, ...fan },
      { ...heater, maxDuty: 1, maxDutyPerS: 1, ...lamp },
    ],
    thermal: {
      roomAirC: 30,
      bedAir: { riseC: 10, decayMm: 20 },
      convection: { h0WM2K: 12, fans: { [partFan.id]: { h1WM2K: 70, exponent: 0.7 } } },
      lamps: { [heater.id]: { fluxAtFullWM2: 12_000, sideShare: 0.5, exponent: 1, lagS: 1 } },
      surroundings: { riseAtFullLampC: 10, lagS: 180 },
      bedContactM2KW: 0.001,
    },
  });
}

const HOLD = { cooling: { channel: "part-fan", rule: "hold" }, heating: { channel: "lamp", rule: "hold" } };
const zone = (name: string, from: number, to: number | undefined, target: string, more: object = {}) => ({
  name,
  from,
  ...(to === undefined ? {} : { to }),
  unit: "mm",
  target,
  ...HOLD,
  ...more,
});
const profileOf = (zones: object[], rest: object = {}): Profile =>
  parseProfile({ format: "quenchline.profile/1", name: "Held", polymer: "PEEK", zones, ...rest });

/** A ring, 40 mm wide and 3 mm thick, on a bed that keeps its first layers in either state's window. */
const ringOf = (count: number, timeS: number | ((i: number) => number), more: Partial<PlanLayer> = {}): PlanLayer[] =>
  layersOf(count, (i) => ({
    timeS: typeof timeS === "number" ? timeS : timeS(i),
    depositedLengthMm: 900,
    areaMm2: 350,
    outlineMm: 232,
    nozzleC: 400,
    bedC: 120,
    waits: [],
    ...more,
  }));

interface Tried {
  plan: Plan;
  /** °C and crystallinity by layer */
  interlayerC: number[];
  crystallinity: number[];
  solid: boolean[];
}

function tryPlan(layers: PlanLayer[], profile: Profile, machine = machineWith(), polymer: Polymer = peek): Tried {
  const plan = planDuties({ layers, machine, profile, polymer });
  const model = makeModel({ layers: layers as never, machine, polymer });
  const results = startMarch(model, channelDuties(plan, layers, machine, profile)).run();
  return {
    plan,
    interlayerC: [...results.interlayerC],
    crystallinity: [...results.crystallinity],
    solid: [...results.timeToSolidS].map((seconds) => !Number.isNaN(seconds)),
  };
}

const codes = ({ plan }: Tried): string[] =>
  plan.advice.map(({ code }) => code).filter((code) => code.startsWith("hold"));

describe("a part held on one state", () => {
  test("semi-crystalline: every layer above the bed is in its window, solid in time and crystalline enough", () => {
    const tried = tryPlan(ringOf(60, 30, { bedC: 140 }), profileOf([zone("all", 0, undefined, "semi-crystalline")]));
    // The bed is colder than the window.
    expect(codes(tried).filter((code) => code !== "hold-too-cold")).toEqual([]);
    expect(tried.plan.advice.find(({ code }) => code === "hold-too-cold")?.message).toMatch(
      /^Layers 1–\d .*a warmer bed/,
    );
    const { tgC, solidBelowC, margins } = peek;
    for (const tempC of tried.interlayerC.slice(9)) {
      expect(tempC).toBeGreaterThan(tgC.value + margins.aboveTgC.value - 1);
      expect(tempC).toBeLessThan(solidBelowC.value + 1);
    }
    expect(Math.min(...tried.crystallinity)).toBeGreaterThan(margins.minCrystallinity.value);
    expect(tried.solid.every(Boolean)).toBe(true);
  });

  test("amorphous: every layer stays below its window's upper end, and crystallises as little as it may", () => {
    const tried = tryPlan(ringOf(60, 30), profileOf([zone("all", 0, undefined, "amorphous")]));
    expect(codes(tried)).toEqual([]);
    const { tgC, margins } = peek;
    for (const tempC of tried.interlayerC) expect(tempC).toBeLessThan(tgC.value - margins.belowTgC.value + 1);
    expect(Math.max(...tried.crystallinity)).toBeLessThan(margins.maxCrystallinity.value);
  });

  test("the fan stays at its gentle baseline while the lamp alone will do", () => {
    const { plan } = tryPlan(
      ringOf(60, 30),
      profileOf([
        zone("all", 0, undefined, "amorphous", { cooling: { channel: "part-fan", rule: "hold", baseDuty: 0.3 } }),
      ]),
    );
    expect(new Set(plan.layers.map(({ duty }) => duty["part-fan"].toFixed(2)))).toEqual(new Set(["0.30"]));
    expect(new Set(plan.layers.map(({ duty }) => duty.lamp)).size).toBeGreaterThan(1);
  });

  test("short layers, which don't cool by themselves, get more fan and no lamp", () => {
    const short = tryPlan(ringOf(60, 7), profileOf([zone("all", 0, undefined, "amorphous")]));
    const middle = short.plan.layers[40].duty;
    expect(middle["part-fan"]).toBeGreaterThan(0.3);
    expect(middle.lamp).toBe(0);
    expect(codes(short)).toEqual([]);
  });

  test("only the lamp, beside a fan on a curve", () => {
    const cooling = { channel: "part-fan", rule: "fixed", duty: 0.3 };
    const tried = tryPlan(ringOf(60, 30), profileOf([zone("all", 0, undefined, "amorphous", { cooling })]));
    expect(codes(tried)).toEqual([]);
    expect(tried.plan.layers.every(({ duty }) => Math.abs(duty["part-fan"] - 0.3) < 0.003)).toBe(true);
  });

  test("only the fan, beside a fixed lamp", () => {
    const heating = { channel: "lamp", rule: "fixed", duty: 0.3 };
    const tried = tryPlan(ringOf(60, 20), profileOf([zone("all", 0, undefined, "amorphous", { heating })]));
    const { tgC, margins } = peek;
    for (const tempC of tried.interlayerC.slice(5)) expect(tempC).toBeLessThan(tgC.value - margins.belowTgC.value + 1);
  });
});

describe("two states in one part", () => {
  const ring = profileOf([zone("base", 0, 6, "semi-crystalline"), zone("lip", 6, undefined, "amorphous")], {
    limits: { lamp: { maxDutyPerLayer: 0.1 }, "part-fan": { maxDutyPerLayer: 0.15 } },
  });

  test("each zone reaches its own; where the change cannot be as sharp as the border, layers are named with the reason", () => {
    const tried = tryPlan(ringOf(60, 30, { bedC: 140 }), ring);
    const { margins } = peek;
    expect(Math.min(...tried.crystallinity.slice(0, 24))).toBeGreaterThan(margins.minCrystallinity.value);
    expect(Math.max(...tried.crystallinity.slice(36))).toBeLessThan(margins.maxCrystallinity.value);
    const missed = tried.crystallinity
      .map((share, p) => ({ share, index: p + 1, lip: p >= 30 }))
      .filter(({ share, lip }) =>
        lip ? share > margins.maxCrystallinity.value : share < margins.minCrystallinity.value,
      );
    for (const { index } of missed)
      expect(
        tried.plan.advice.some(({ layer, code, message }) => {
          const last = Number(/–(\d+)/.exec(message)?.[1] ?? layer);
          return code.startsWith("hold") && layer <= index && index <= last;
        }),
      ).toBe(true);
  });

  test("the lamp steps down before the border, since a layer that got too warm stays crystalline", () => {
    const { plan } = tryPlan(ringOf(60, 30, { bedC: 140 }), ring);
    const lamp = plan.layers.map(({ duty }) => duty.lamp);
    expect(lamp[29]).toBeLessThan(lamp[24] - 0.02);
    for (let p = 1; p < lamp.length; p++) expect(Math.abs(lamp[p] - lamp[p - 1])).toBeLessThan(0.1 + 1e-9);
  });

  test("layers that get too cold for it say so: the sample's last ones below the lip", () => {
    const machine = parseMachine(json("machines/tern.json"));
    const reader = new ToolpathReader(machine);
    reader.push(readFileSync(new URL("../../../samples/seal-ring.gcode", import.meta.url)));
    const { layers } = reader.end("");
    const profile = parseProfile(json("profiles/seal-ring-held-stiff-and-tough.json"));
    const { advice } = planDuties({ layers, machine, profile, polymer: peek });
    const last = advice.find(({ code, layer }) => code === "hold-too-cold" && layer > 20);
    expect(last?.message).toContain("step down ahead of a colder state above it");
  });

  test("bands that alternate go up and down, and a graded zone from one state to the other", () => {
    const pattern = { kind: "alternating", amorphousLayers: 12, semiCrystallineLayers: 12, first: "semi-crystalline" };
    const bands = tryPlan(ringOf(72, 40), profileOf([zone("bands", 0, undefined, "none", { pattern })]));
    for (const [from, to, semi] of [
      [4, 10, true],
      [16, 22, false],
      [28, 34, true],
      [40, 46, false],
    ] as const) {
      const meanC = bands.interlayerC.slice(from, to).reduce((sum, tempC) => sum + tempC, 0) / (to - from);
      if (semi) expect(meanC).toBeGreaterThan(peek.tgC.value);
      else expect(meanC).toBeLessThan(peek.tgC.value);
    }
    const graded = { kind: "graded", from: "semi-crystalline", to: "amorphous" };
    const way = tryPlan(ringOf(60, 30), profileOf([zone("way", 0, undefined, "none", { pattern: graded })]));
    const tops = [10, 20, 30, 40, 50, 59].map((p) => way.interlayerC[p]);
    expect(tops).toEqual([...tops].sort((a, b) => b - a));
    expect(tops[0]).toBeGreaterThan(peek.tgC.value);
    expect(tops[5]).toBeLessThan(peek.tgC.value);
  });
});

describe("layers that can't be held", () => {
  const amorphous = profileOf([zone("all", 0, undefined, "amorphous")]);

  test("too short a layer is named with the layer time it needs, and that time does", () => {
    const layers = ringOf(40, 2);
    const tried = tryPlan(layers, amorphous);
    const found = tried.plan.advice.find(({ code }) => code === "hold-too-warm" || code === "hold-not-solid")!;
    expect(found.message).toMatch(/part-fan is at its highest, 1\.00/);
    const needed = Number(/layer time of at least ([\d.]+) s/.exec(found.message)![1]);
    expect(needed).toBeGreaterThan(2);
    expect(codes(tryPlan(ringOf(40, needed * 1.1), amorphous))).toEqual([]);
    expect(codes(tryPlan(ringOf(40, needed * 0.8), amorphous))).not.toEqual([]);
  });

  test("a fan that may not do enough is named with the duty it would need", () => {
    const profile = profileOf([zone("all", 0, undefined, "amorphous")], { limits: { "part-fan": { maxDuty: 0.3 } } });
    const found = tryPlan(ringOf(40, 6), profile).plan.advice.find(({ code }) => code === "hold-too-warm")!;
    const needed = Number(/part-fan at ([\d.]+) would do/.exec(found.message)![1]);
    expect(needed).toBeGreaterThan(0.3);
    const wider = profileOf([zone("all", 0, undefined, "amorphous")], {
      limits: { "part-fan": { maxDuty: Math.min(1, needed + 0.05) } },
    });
    expect(codes(tryPlan(ringOf(40, 6), wider))).not.toContain("hold-too-warm");
  });

  test("too weak a lamp is named, with shorter layers as a way out", () => {
    const machine = machineWith({ lamp: { maxDuty: 0.3 } });
    const tried = tryPlan(ringOf(40, 90), profileOf([zone("all", 0, undefined, "semi-crystalline")]), machine);
    const found = tried.plan.advice.find(({ code }) => code === "hold-too-cold")!;
    expect(found.message).toMatch(/lamp is at its highest, 0\.30/);
    expect(found.message).toMatch(/layer time of at most [\d.]+ s|lamp at [\d.]+ would do/);
  });

  test("bed layers with duties of their own are not in charge of hold, and it says so", () => {
    const profile = profileOf([zone("all", 0, undefined, "amorphous")], {
      bedLayers: { count: 3, duty: { lamp: 0.9 } },
    });
    const tried = tryPlan(ringOf(30, 30), profile);
    expect(tried.plan.layers.slice(0, 3).map(({ duty }) => duty.lamp.toFixed(1))).toEqual(["0.9", "0.9", "0.9"]);
    expect(tried.plan.advice.find(({ code }) => code === "hold-elsewhere")!.message).toMatch(/^Layers 1–3 \(3\)/);
  });
});

describe("whatever the part", () => {
  const semi = zone("base", 0, 2, "semi-crystalline");
  const profile = profileOf([semi, zone("rest", 2, undefined, "amorphous")], {
    limits: { lamp: { maxDuty: 0.8, maxDutyPerLayer: 0.2, endRampMm: 1 }, "part-fan": { maxDuty: 0.7 } },
    lead: { lamp: "settle" },
  });
  const machine = machineWith();

  test("duties keep their limits, the plan is the same every time, and nothing diverges", () => {
    const times = fc.array(fc.constantFrom(0, 0.4, 1, 3, 9, 30, 120), { minLength: 1, maxLength: 40 });
    fc.assert(
      fc.property(times, fc.constantFrom(0, 20, 350, 5_000), (seconds, areaMm2) => {
        const layers = ringOf(seconds.length, (i) => seconds[i], { areaMm2 });
        const { plan, interlayerC } = tryPlan(layers, profile, machine);
        let before: number | undefined;
        for (const { duty } of plan.layers) {
          expect(duty["part-fan"] === 0 || (duty["part-fan"] >= 0.12 && duty["part-fan"] <= 0.7)).toBe(true);
          expect(duty.lamp).toBeGreaterThanOrEqual(0);
          expect(duty.lamp).toBeLessThanOrEqual(0.8);
          if (before !== undefined) expect(Math.abs(duty.lamp - before)).toBeLessThanOrEqual(0.2 + 1e-9);
          before = duty.lamp;
        }
        expect(interlayerC.every(Number.isFinite)).toBe(true);
        expect(planDuties({ layers, machine, profile, polymer: peek })).toEqual(plan);
      }),
      { numRuns: 12 },
    );
  });

  test("a card that says amorphous is out of reach refuses the target, and so do patterns that need it", () => {
    const pa12 = parsePolymer(json("polymers/pa-12.json"));
    const pattern = { kind: "alternating", amorphousLayers: 2, semiCrystallineLayers: 2 };
    for (const zones of [[zone("all", 0, undefined, "amorphous")], [zone("all", 0, undefined, "none", { pattern })]]) {
      const asked = { ...profileOf(zones), polymer: "PA 12" };
      const refusal = refusalOf(() => planDuties({ layers: ringOf(5, 20), machine, profile: asked, polymer: pa12 }));
      expect(refusal.code).toBe("amorphous-out-of-reach");
    }
  });
});
