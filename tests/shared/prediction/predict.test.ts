import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parsePolymer } from "#shared/formats/polymer.ts";
import { parsePrediction, writePrediction } from "#shared/formats/prediction.ts";
import { leverMap } from "#shared/prediction/lever-map.ts";
import { startMarch } from "#shared/prediction/march.ts";
import { makeModel } from "#shared/prediction/model.ts";
import { type PredictInput, predict } from "#shared/prediction/predict.ts";
import type { WantedState } from "#shared/prediction/verdicts.ts";
import { refusal, tern } from "#tests/shared/formats/documents.ts";
import { duties, layersOf, machineWith, polymerWith } from "#tests/shared/prediction/parts.ts";

const COUNT = 30;

function ask(rest: Partial<PredictInput> & { fan?: number; lamp?: number; wants?: WantedState } = {}) {
  const { fan = 0, lamp = 0.3, wants = "none", ...input } = rest;
  const layers = input.layers ?? layersOf(COUNT);
  return predict({
    layers,
    machine: machineWith(),
    polymer: polymerWith(),
    duties: duties(layers.length, fan, lamp),
    wanted: layers.map(() => wants),
    ...input,
  });
}

const sampleCard = (name: string) =>
  parsePolymer(JSON.parse(readFileSync(new URL(`../../../samples/polymers/${name}.json`, import.meta.url), "utf8")));
const RANGED = {
  lamps: { lamp: { fluxAtFullWM2: { low: 4_000, typical: 6_000, high: 8_000 }, sideShare: 0.5, exponent: 1, lagS: 0 } },
};

describe("a prediction", () => {
  test("is a document that is read back as it was written", () => {
    const prediction = ask();
    expect(parsePrediction(JSON.parse(writePrediction(prediction)))).toEqual(prediction);
    expect(prediction.layers).toHaveLength(COUNT);
  });

  test("says null, not a number, where there is nothing to say", () => {
    const { layers } = ask({ lamp: 1 });
    expect(layers[COUNT - 1].highestReheatC).toBeNull();
    expect(layers[3].highestReheatC).toBeGreaterThan(layers[3].interlayerC);
    expect(ask({ band: false }).layers[0].band).toBeNull();
    // PP is above Tg in any room.
    expect(ask({ polymer: sampleCard("pp") }).layers[5].timeAboveTgS).toBeNull();
  });

  test("the first layer meets the bed, the others the layer below, half way between their temperatures", () => {
    const { layers } = ask();
    expect(layers[0].contactC).toBe((390 + 140) / 2);
    expect(layers[7].contactC).toBeCloseTo((390 + layers[6].interlayerC) / 2, 9);
  });
});

describe("the band", () => {
  test("has no width where nothing is uncertain", () => {
    for (const { band, interlayerC, crystallinity } of ask().layers) {
      expect(band).toMatchObject({
        interlayerC: [interlayerC, interlayerC],
        crystallinity: [crystallinity, crystallinity],
      });
    }
  });

  test("runs from the cold to the hot end", () => {
    const { layers } = ask({ machine: machineWith(RANGED) });
    const at = (low: number) => ask({ lamp: (0.3 * low) / 6_000 }).layers;
    const [cold, hot] = [at(4_000), at(8_000)];
    layers.forEach(({ band, interlayerC }, p) => {
      expect(band?.interlayerC[0]).toBeCloseTo(cold[p].interlayerC, 6);
      expect(band?.interlayerC[1]).toBeCloseTo(hot[p].interlayerC, 6);
      expect(band?.interlayerC[0]).toBeLessThan(interlayerC);
    });
  });

  test("an unverified absorptivity widens it", () => {
    const { layers } = ask({ polymer: sampleCard("peek") });
    // Every number has its band, and lies within it.
    for (const layer of layers)
      for (const name of [
        "interlayerC",
        "contactC",
        "timeAboveTgS",
        "timeToSolidS",
        "highestReheatC",
        "crystallinity",
      ] as const) {
        const value = layer[name];
        const [from, to] = layer.band?.[name] ?? [value, value];
        if (value === null) continue;
        expect(from).not.toBeNull();
        expect(from!).toBeLessThanOrEqual(value);
        if (to !== null) expect(to).toBeGreaterThanOrEqual(value);
      }
    const [low, high] = layers[20].band?.interlayerC ?? [0, 0];
    expect(high - low).toBeGreaterThan(15);
  });
});

describe("what the machine document leaves out", () => {
  test("is taken from stated ranges and named, and the prediction is uncalibrated", () => {
    const machine = parseMachine(tern());
    const { calibration, assumed, layers } = ask({ machine });
    expect(calibration).toBe("uncalibrated");
    expect(assumed.map(({ path }) => path)).toContain("thermal.lamps.lamp.fluxAtFullWM2");
    expect(assumed.every(({ source }) => source.includes("unverified"))).toBe(true);
    expect(layers[10].band?.interlayerC[1]).toBeGreaterThan(layers[10].interlayerC);
    // The lamp's settle time is known.
    expect(assumed.map(({ path }) => path)).not.toContain("thermal.lamps.lamp.lagS");
  });

  test("with all of it given nothing is assumed, and a named calibration is named", () => {
    const { assumed, calibration } = ask({ machine: machineWith({ calibration: "seal rings, first trial" }) });
    expect(assumed).toEqual([]);
    expect(calibration).toBe("seal rings, first trial");
  });

  test("an absorbed flux that is assumed does not meet the card's absorptivity a second time", () => {
    const machine = parseMachine({ ...tern(), thermal: { surroundings: { riseAtFullLampC: 0 } } });
    const dark = parsePolymer({ ...polymerWith(), lampAbsorptivity: sampleCard("peek").lampAbsorptivity });
    expect(ask({ machine, polymer: dark }).layers).toEqual(ask({ machine }).layers);
  });
});

describe("verdicts", () => {
  test("amorphous when cold, semi-crystalline when warm, and whether that was wanted", () => {
    const cold = ask({ fan: 0.7, lamp: 0, wants: "amorphous" }).layers[20];
    expect(cold.verdicts).toMatchObject({ state: "amorphous", reaches: "yes", solid: true });
    const warm = ask({ lamp: 1, wants: "amorphous" }).layers[20];
    expect(warm.verdicts).toMatchObject({ state: "semi-crystalline", reaches: "no" });
    expect(ask({ lamp: 1, wants: "semi-crystalline" }).layers[20].verdicts.reaches).toBe("yes");
    expect(ask({ lamp: 1 }).layers[20].verdicts.reaches).toBeNull();
  });

  test("a target that only one end of the band reaches lies within the band", () => {
    const machine = machineWith({ ...RANGED, convection: { h0WM2K: { low: 10, typical: 25, high: 60 } } });
    expect(ask({ machine, lamp: 0.3, wants: "semi-crystalline" }).layers[20].verdicts.reaches).toBe("within the band");
  });

  test("the profile's margins override the card's", () => {
    const { crystallinity } = ask({ lamp: 0.2, fan: 0.05 }).layers[20];
    const margins = { maxCrystallinity: crystallinity + 0.01, minCrystallinity: crystallinity + 0.02 };
    expect(ask({ lamp: 0.2, fan: 0.05, margins }).layers[20].verdicts.state).toBe("amorphous");
    expect(
      ask({ lamp: 0.2, fan: 0.05, margins: { maxCrystallinity: 0, minCrystallinity: 0 } }).layers[20].verdicts.state,
    ).toBe("semi-crystalline");
  });

  test("a fast and hot layer is not solid in time, and the advice says what would help", () => {
    const layers = layersOf(COUNT, () => ({ timeS: 1.5 }));
    const { layers: predicted, advice } = ask({ layers, lamp: 1 });
    const melted = predicted[20];
    expect(melted.timeToSolidS).toBeNull();
    expect(melted.verdicts.solid).toBe(false);
    expect(advice.find(({ code }) => code === "not-solid")?.message).toMatch(/^Layers? .*not expected to hold shape/);
  });

  test("a cold interface does not weld", () => {
    const polymer = polymerWith({ weldAboveC: 230 });
    const { layers, advice } = ask({ polymer, fan: 1, lamp: 0 });
    expect(layers[20].verdicts.welds).toBe(false);
    expect(advice.some(({ code }) => code === "no-weld")).toBe(true);
  });

  test("amorphous is refused where the card says it is out of reach", () => {
    const polymer = sampleCard("pa-12");
    const { code, message } = refusal(() => ask({ polymer, wants: "amorphous" }));
    expect(code).toBe("amorphous-out-of-reach");
    expect(message).toContain("PA 12");
    expect(() => ask({ polymer, wants: "semi-crystalline" })).not.toThrow();
  });
});

test("waits of unknown length and a missing nozzle temperature are assumed and said", () => {
  const layers = layersOf(COUNT, (i) => ({
    nozzleC: null,
    waits:
      i === 9 ? [{ kind: "pause", line: 1, seconds: null }] : i === 12 ? [{ kind: "dwell", line: 1, seconds: 5 }] : [],
  }));
  const { advice, layers: predicted } = ask({ layers });
  expect(advice.map(({ code, layer }) => [code, layer])).toEqual(
    expect.arrayContaining([
      ["nozzle-assumed", 1],
      ["wait-estimated", 10],
    ]),
  );
  expect(predicted[9].interlayerC).toBeLessThan(predicted[8].interlayerC - 20);
  // A dwell is in the layer's time already.
  expect(Math.abs(predicted[12].interlayerC - predicted[14].interlayerC)).toBeLessThan(3);
});

test("a layer that only a pause lets solidify is solid that much later", () => {
  const pause = { kind: "pause", line: 1, seconds: 200 } as const;
  const layers = layersOf(COUNT, (i) => ({ timeS: 1.5, waits: i === 15 ? [pause] : [] }));
  const { timeToSolidS } = ask({ layers, lamp: 1 }).layers[15];
  expect(timeToSolidS).toBeGreaterThan(1.5);
  expect(timeToSolidS).toBeLessThan(201.5);
});

test("one part through every card: amorphous polymers stay so, fast ones crystallise, all results are numbers", () => {
  const layers = layersOf(COUNT, () => ({ nozzleC: null, bedC: 100 }));
  const of = (name: string) => ask({ layers, polymer: sampleCard(name), fan: 0.2, lamp: 0.4 }).layers[15];
  const all = Object.fromEntries(
    ["peek", "pekk-60-40", "pekk-80-20", "pps", "pa-12", "pa-6", "pp", "pei"].map((name) => [name, of(name)]),
  );
  for (const layer of Object.values(all))
    for (const value of [layer.interlayerC, layer.contactC]) expect(value).toBeGreaterThan(20);
  expect(all.pei.crystallinity).toBe(0);
  expect(all.pei.verdicts.state).toBe("amorphous");
  for (const [name, attainable] of [
    ["pa-12", 0.22],
    ["pa-6", 0.3],
    ["pp", 0.5],
  ] as const)
    expect(all[name].crystallinity).toBeGreaterThan(0.95 * attainable);
  expect(all["pekk-60-40"].crystallinity).toBeLessThan(all["pekk-80-20"].crystallinity);
});

describe("the map of the two levers", () => {
  const layer = { timeS: 20, heightMm: 0.2, areaMm2: 100, outlineMm: 100, nozzleC: 390 };
  const grid = Array.from({ length: 21 }, (_, i) => i / 20);
  const ask = () =>
    leverMap({
      machine: machineWith(),
      polymer: polymerWith(),
      layer,
      fan: "part-fan",
      lamp: "lamp",
      fanDuties: grid,
      lampDuties: grid,
    });

  test("agrees with a long march at its pairs of duties, to half a degree and 0.01", () => {
    const map = ask();
    for (const [l, f] of [
      [0, 0],
      [6, 2],
      [10, 0],
      [20, 0],
      [10, 10],
      [20, 5],
      [20, 20],
    ]) {
      const model = makeModel({ layers: layersOf(150), machine: machineWith(), polymer: polymerWith() });
      const results = startMarch(model, duties(150, grid[f], grid[l])).run();
      expect(Math.abs(map.interlayerC[l * 21 + f] - results.interlayerC[99])).toBeLessThan(0.5);
      expect(Math.abs(map.crystallinity[l * 21 + f] - results.crystallinity[80])).toBeLessThan(0.01);
    }
  });

  test("rises with the lamp and falls with the fan", () => {
    const { interlayerC } = ask();
    for (let l = 0; l < 21; l++)
      for (let f = 0; f < 21; f++) {
        if (l > 0) expect(interlayerC[l * 21 + f]).toBeGreaterThan(interlayerC[(l - 1) * 21 + f]);
        if (f > 0) expect(interlayerC[l * 21 + f]).toBeLessThan(interlayerC[l * 21 + f - 1]);
      }
  });
});
