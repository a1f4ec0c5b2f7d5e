import { describe, expect, test } from "vitest";
import { type PlanDocument, parsePlan, writePlan } from "#shared/formats/plan.ts";
import { type ProofDocument, parseProof, writeProof } from "#shared/formats/proof.ts";
import { parseReading, type ReadingDocument, writeReading } from "#shared/formats/reading.ts";
import { problemsOf } from "#tests/shared/formats/documents.ts";

const sha256 = "0123456789abcdef".repeat(4);

const reading: ReadingDocument = {
  format: "quenchline.reading/1",
  file: { bytes: 120, lines: 9, sha256, newline: "lf" },
  totals: { printTimeS: 12.5, layers: 1, depositedLengthMm: 100, travelLengthMm: 20, filamentMm: 4 },
  layers: [
    {
      index: 1,
      object: 1,
      zMm: 0.2,
      heightMm: 0.2,
      firstLine: 1,
      lastLine: 9,
      timeS: 12.5,
      extrudingTimeS: 10,
      depositedLengthMm: 100,
      travelLengthMm: 20,
      filamentMm: 4,
      volumeMm3: 9.6,
      areaMm2: 48,
      outlineMm: 40,
      outlineFrom: "geometry",
      boxMm: { min: [-5, -5], max: [5, 5] },
      nozzleC: 400,
      bedC: null,
      duty: { "part-fan": { mean: 0.5, min: 0, max: 1, commands: 2 } },
      waits: [{ kind: "pause", line: 4, seconds: null }],
    },
  ],
  findings: [{ code: "no-layer-markers", severity: "info", message: "The file has no layer markers." }],
};

const plan: PlanDocument = {
  format: "quenchline.plan/1",
  layers: [
    { index: 1, duty: { lamp: 0.4, "part-fan": 0 }, reason: { lamp: ["bed layers"], "part-fan": ["bed layers"] } },
  ],
  advice: [{ layer: 1, code: "too-short-to-solidify", message: "Print two at once." }],
};

const proof: ProofDocument = {
  format: "quenchline.proof/1",
  passed: true,
  input: { sha256, bytes: 120 },
  output: { sha256, bytes: 150 },
  kept: { lines: 8 },
  removed: { lines: 1 },
  inserted: { lines: 3 },
  renumbered: { lines: 0 },
  checks: [{ id: "bytes-kept", passed: true, detail: "8 lines" }],
  engine: "0.1.0",
  profile: null,
  machine: { name: "Tern", sha256 },
};

test("a reading, a plan and a proof are read back as they were written", () => {
  expect(parseReading(JSON.parse(writeReading(reading)))).toEqual(reading);
  expect(parsePlan(JSON.parse(writePlan(plan)))).toEqual(plan);
  expect(parseProof(JSON.parse(writeProof(proof)))).toEqual(proof);
});

describe("refused are", () => {
  test("a duty outside 0-1 in a plan", () => {
    const spoilt = { ...plan, layers: [{ ...plan.layers[0], duty: { lamp: 1.2 } }] };
    expect(problemsOf(() => parsePlan(spoilt))[0]).toMatch(
      /^layers\[0\]\.duty\.lamp: must be between 0 and 1, got 1\.2/,
    );
  });

  test("a layer number below 1", () => {
    expect(problemsOf(() => parsePlan({ ...plan, advice: [{ layer: 0, code: "", message: "" }] }))[0]).toMatch(
      /^advice\[0\]\.layer: must be a whole number between 1 and/,
    );
  });

  test("a proof that passes although a check failed, or although there is none", () => {
    for (const checks of [[{ id: "duty-limits", passed: false, detail: "" }], []]) {
      expect(problemsOf(() => parseProof({ ...proof, checks }))[0]).toMatch(/^passed: is true, but a check failed/);
    }
  });

  test("a digest that is none", () => {
    const spoilt = { ...proof, input: { sha256: sha256.toUpperCase(), bytes: 1 } };
    expect(problemsOf(() => parseProof(spoilt))[0]).toMatch(/^input\.sha256: is no SHA-256 digest/);
  });

  test("an unknown kind of wait in a reading", () => {
    const layer = { ...reading.layers[0], waits: [{ kind: "lunch", line: 1, seconds: 1 }] };
    expect(problemsOf(() => parseReading({ ...reading, layers: [layer] }))[0]).toMatch(
      /^layers\[0\]\.waits\[0\]\.kind: must be one of/,
    );
  });
});
