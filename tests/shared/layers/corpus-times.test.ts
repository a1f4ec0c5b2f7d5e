import { describe, expect, test, vi } from "vitest";
import type { Machine } from "#shared/formats/machine.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { CORPUS_FILES, type CorpusFile, corpusIsHere, corpusTiming, corpusToolpath } from "#tests/helpers/corpus.ts";
import { cutEvery, readChunks } from "#tests/helpers/reading.ts";
import { tern } from "#tests/helpers/tern.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

const CHUNK = 1 << 16;

const read = (name: CorpusFile, machine?: Machine): Reading =>
  readChunks(cutEvery(corpusToolpath(name), CHUNK), machine);

/** Relative errors of the layer times against one column of the reference, in ascending order, and of their sum. */
function errorsOf(name: CorpusFile, column: string, { layers, totals }: Reading) {
  const reference = corpusTiming(name);
  expect(layers.map(({ firstLine }) => firstLine)).toEqual(reference.layers.map(({ firstLine }) => firstLine));
  const errors = reference.layers.map(({ timeS }, k) => Math.abs(layers[k].timeS / timeS[column] - 1));
  const totalS = reference.layers.reduce((sum, { timeS }) => sum + timeS[column], 0);
  errors.sort((a, b) => a - b);
  return {
    median: errors[Math.floor(errors.length / 2)],
    p95: errors[Math.floor(errors.length * 0.95)],
    worst: errors[errors.length - 1],
    total: Math.abs(totals.printTimeS / totalS - 1),
  };
}

/** The references are rounded to a tenth of a millisecond: that is what the shortest layers differ by. */
const close = (errors: ReturnType<typeof errorsOf>, within: number): void => {
  expect(errors.median).toBeLessThan(within);
  expect(errors.p95).toBeLessThan(0.01);
  expect(errors.total).toBeLessThan(within);
};

describe.skipIf(!corpusIsHere)("layer times of real toolpaths", () => {
  const square = (more: object) => ({
    cornering: { rule: "square-corner-velocity", speedMmS: 5, cruiseRatio: 0.5, extruderStepMmS: 1, ...more },
  });

  describe("agree with an independent look-ahead planner within 0.01 %", () => {
    test.each(CORPUS_FILES)("%s", (name) => {
      const reading = read(name);
      close(errorsOf(name, "A", reading), 1e-4);
      const reference = corpusTiming(name);
      expect(reading.layers.map(({ zMm }) => zMm)).toEqual(reference.layers.map(({ zMm }) => zMm));
      expect(Math.abs(reading.beforeFirstLayerS - reference.beforeFirstLayerS)).toBeLessThan(0.001);
    });
  });

  describe("agree without a least cruise too", () => {
    const machine = tern({ motion: square({ cruiseRatio: 0 }) });
    test.each(CORPUS_FILES)("%s", (name) => {
      close(errorsOf(name, "A_mcr0", read(name, machine)), 1e-4);
    });
  });

  describe("agree when the file's own acceleration commands are obeyed", () => {
    const fast = (speedMmS: number): Machine =>
      tern({
        motion: {
          ...square({ speedMmS }),
          maxSpeedMmS: 500,
          accelMmS2: { print: 20_000, travel: 20_000, retract: 20_000 },
          honourFileLimits: true,
        },
      });

    test("c04, which sets limits by name, corners included", () => {
      expect(errorsOf("c04", "A_file", read("c04", fast(20))).median).toBeLessThan(1e-3);
    });

    test("c02, which sets an acceleration at nearly every move", () => {
      expect(errorsOf("c02", "A_file", read("c02", fast(5))).median).toBeLessThan(1e-3);
    });
  });

  test("agree with a 16-block planner with axis jerk within 0.05 %", () => {
    const machine = tern({
      motion: {
        cornering: { rule: "axis-jerk", jerkMmS: { x: 8, y: 8, z: 0.4, e: 5 } },
        lookAhead: 16,
        stopAtExtrudeOnly: false,
        extruderLimits: "every-move",
        axes: {
          x: { maxSpeedMmS: 200, maxAccelMmS2: 1500 },
          y: { maxSpeedMmS: 200, maxAccelMmS2: 1500 },
          z: { maxSpeedMmS: 10, maxAccelMmS2: 100 },
          e: { maxSpeedMmS: 60, maxAccelMmS2: 1500 },
        },
      },
    });
    const errors = errorsOf("c02", "B_jerk16", read("c02", machine));
    expect(errors.total).toBeLessThan(5e-4);
    expect(errors.median).toBeLessThan(5e-4);
  });

  test("are far from distance over feed: look-ahead is not optional", () => {
    const naive = corpusTiming("c02").layers.map(({ timeS }) => timeS.naive_raw);
    const tooShort = read("c02").layers.map(({ timeS }, k) => timeS / naive[k]);
    expect(Math.min(...tooShort)).toBeGreaterThan(1.05);
    expect(Math.max(...tooShort)).toBeGreaterThan(2);
  });
});

describe.skipIf(!corpusIsHere)("one toolpath written in several dialects", () => {
  const plain = corpusIsHere ? read("d00-base-abs-e") : undefined;

  test.each(CORPUS_FILES.filter((name) => /^d0[24567]/.test(name)))(
    "%s has the same layers and times to a microsecond",
    (name) => {
      const reading = read(name);
      expect(reading.layers).toHaveLength(6);
      for (const [k, layer] of reading.layers.entries()) {
        const same = plain!.layers[k];
        expect(Math.abs(layer.timeS - same.timeS)).toBeLessThan(1e-6);
        expect(Math.abs(layer.extrudingTimeS - same.extrudingTimeS)).toBeLessThan(1e-6);
        expect(Math.abs(layer.filamentMm - same.filamentMm)).toBeLessThan(1e-4);
        expect(Math.abs(layer.depositedLengthMm - same.depositedLengthMm)).toBeLessThan(1e-2);
        expect([layer.zMm, layer.heightMm, layer.nozzleC, layer.bedC]).toEqual([same.zMm, same.heightMm, 200, 60]);
      }
    },
  );

  test("d02 is known as numbered, d05 by its mixed line ends", () => {
    expect(read("d02-numbered-checksum").file).toMatchObject({ numbered: true, newline: "lf" });
    expect(read("d05-glued-lowercase-crlf").file.newline).toBe("crlf");
    expect(plain!.file).toMatchObject({ numbered: false, newline: "lf", finalNewline: true });
  });

  test("d03, which prints the object twice, counts layers on and objects up", () => {
    const { layers, findings } = read("d03-sequential-two-objects");
    expect(layers.map(({ object }) => object)).toEqual([1, 1, 1, 1, 1, 1, 2, 2, 2, 2, 2, 2]);
    expect(layers.map(({ index }) => index)).toEqual(Array.from({ length: 12 }, (_, k) => k + 1));
    expect(findings).toContainEqual(expect.objectContaining({ code: "sequential" }));
  });

  test("d01 retracts in the firmware: the same material, a little more time", () => {
    const reading = read("d01-firmware-retract-rel-e");
    expect(reading.totals.depositedLengthMm).toBeCloseTo(plain!.totals.depositedLengthMm, 0);
    expect(reading.totals.printTimeS).toBeGreaterThan(plain!.totals.printTimeS);
  });
});
