import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { parsePolymer } from "#shared/formats/polymer.ts";
import type { PredictionLayer } from "#shared/prediction/model.ts";
import { predict } from "#shared/prediction/predict.ts";
import { duties, layersOf, machineWith } from "#tests/shared/prediction/parts.ts";

const COUNT = 60;
const sampleCard = (name: string) =>
  parsePolymer(JSON.parse(readFileSync(new URL(`../../../samples/polymers/${name}.json`, import.meta.url), "utf8")));

interface Case {
  polymer?: string;
  fan?: number;
  lamp?: number | ((i: number) => number);
  thermal?: object;
  each?: (i: number) => Partial<PredictionLayer>;
}

const printed = ({ polymer = "peek", fan = 0.1, lamp = 0, thermal, each }: Case) =>
  predict({
    layers: layersOf(COUNT, each),
    machine: machineWith({
      lamps: { lamp: { fluxAtFullWM2: 10_000, sideShare: 0.5, exponent: 1, lagS: 1 } },
      ...thermal,
    }),
    polymer: sampleCard(polymer),
    duties: duties(COUNT, fan, lamp),
    wanted: layersOf(COUNT).map(() => "none"),
    band: false,
  }).layers;

/** A layer in mid-part. */
const MIDDLE = 30;

// Common practice in the trade; no source.
describe("as the trade knows it", () => {
  test("a layer kept well below Tg stays amorphous, one held well above it crystallises", () => {
    const cold = printed({ fan: 0.4 })[MIDDLE];
    const warm = printed({ fan: 0, lamp: 0.9 })[MIDDLE];
    expect(cold.interlayerC).toBeLessThan(143 - 15);
    expect(cold.verdicts.state).toBe("amorphous");
    expect(warm.interlayerC).toBeGreaterThan(143 + 15);
    expect(warm.verdicts.state).toBe("semi-crystalline");
  });

  test("just above Tg is slow, and for PEKK 60/40 far too slow", () => {
    const lamp = 0.75;
    const [peek, slow] = ["peek", "pekk-60-40"].map((polymer) => printed({ polymer, fan: 0, lamp })[MIDDLE]);
    expect(slow.interlayerC).toBeGreaterThan(160);
    expect(peek.crystallinity).toBeGreaterThan(0.3);
    expect(slow.crystallinity).toBeLessThan(0.05);
  });

  test("short layers come out hotter, solidify too late, and need more cooling", () => {
    const short = printed({ lamp: 0.3, each: () => ({ timeS: 2 }) })[MIDDLE];
    const long = printed({ lamp: 0.3, each: () => ({ timeS: 60 }) })[MIDDLE];
    expect(short.interlayerC).toBeGreaterThan(long.interlayerC + 30);
    expect(short.verdicts.solid).toBe(false);
    expect(long.verdicts.solid).toBe(true);
    expect(printed({ lamp: 0.3, fan: 1, each: () => ({ timeS: 2 }) })[MIDDLE].interlayerC).toBeLessThan(
      short.interlayerC,
    );
  });

  test("too little heat: long layers with much fan do not weld", () => {
    expect(printed({ fan: 1, each: () => ({ timeS: 120 }) })[MIDDLE].verdicts.welds).toBe(false);
    expect(printed({ fan: 0, lamp: 0.5 })[MIDDLE].verdicts.welds).toBe(true);
  });

  test("the lamp switches the state within one part", () => {
    const layers = printed({ fan: 0.15, lamp: (i) => (i < 30 ? 1 : 0) });
    expect(layers[10].verdicts.state).toBe("semi-crystalline");
    expect(layers[50].verdicts.state).toBe("amorphous");
  });

  test("PP and the polyamides crystallise whatever is done", () => {
    for (const polymer of ["pp", "pa-6", "pa-12"]) {
      const each = () => ({ nozzleC: 240, bedC: 90 });
      for (const fan of [0, 0.5])
        expect(printed({ polymer, fan, each })[MIDDLE].verdicts.state).toBe("semi-crystalline");
    }
  });
});

describe("published directions", () => {
  test("warmer surroundings raise the crystallinity of PEEK (Yang et al. 2017, J. Mater. Process. Technol. 248, 1-7)", () => {
    const at = (roomAirC: number) => printed({ fan: 0, thermal: { roomAirC } })[MIDDLE].crystallinity;
    const [cold, warm, hot] = [25, 110, 200].map(at);
    expect(cold).toBeLessThan(warm);
    expect(warm).toBeLessThanOrEqual(hot);
    expect(hot).toBeGreaterThan(cold + 0.1);
  });

  test("one part per plate, that is shorter layers, welds hotter than several (Basgul et al. 2020, Materialia 10, 100650)", () => {
    const contact = (parts: number) => printed({ each: () => ({ timeS: 8 * parts }) })[MIDDLE].contactC;
    expect(contact(1)).toBeGreaterThan(contact(4));
    expect(contact(4)).toBeGreaterThan(contact(8));
  });

  test("heat on the fresh layer raises the contact temperature (infrared preheating, PMC7284967, 2020)", () => {
    expect(printed({ lamp: 0.6 })[MIDDLE].contactC).toBeGreaterThan(printed({ lamp: 0 })[MIDDLE].contactC + 5);
  });
});
