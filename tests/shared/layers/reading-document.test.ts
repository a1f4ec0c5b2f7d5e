import { expect, test } from "vitest";
import { parseReading, writeReading } from "#shared/formats/reading.ts";
import { Findings } from "#shared/layers/findings.ts";
import { readingDocument } from "#shared/layers/reading-document.ts";
import { heights, marker, rings, START } from "#tests/helpers/part.ts";
import { readText } from "#tests/helpers/reading.ts";

const reading = readText([...START, ...rings(heights(3), (k) => [...marker(k), "M106 S85", "G4 P100"]), "?"]);
const document = readingDocument({ ...reading, file: { ...reading.file, sha256: "ab".repeat(32) } });

test("a reading becomes a document with the same layers, totals and findings", () => {
  expect(document).toMatchObject({
    format: "quenchline.reading/1",
    file: { lines: reading.file.lines, newline: "lf" },
  });
  expect(document.layers).toHaveLength(3);
  for (const [k, layer] of document.layers.entries()) {
    expect(layer.timeS).toBeCloseTo(reading.layers[k].timeS, 8);
    expect(layer.duty["part-fan"].max).toBeCloseTo(1 / 3, 8);
    expect(layer.waits).toEqual(reading.layers[k].waits);
    expect(Object.keys(layer)).not.toContain("firstByte");
  }
  expect(document.findings.map(({ code }) => code)).toEqual(reading.findings.map(({ code }) => code));
});

test("it is written and read back unchanged", () => {
  expect(parseReading(JSON.parse(writeReading(document)))).toEqual(document);
});

test("the dust of binary fractions is off its measures", () => {
  const dusty = readText(["G90", "M83", "G1 X0.1 Y0 Z0.2 F600", "G1 X0.3 E0.1", "G1 X0.6 E0.2"]);
  const { totals, layers } = readingDocument({ ...dusty, file: { ...dusty.file, sha256: "ab".repeat(32) } });
  expect(totals.filamentMm).toBe(0.3);
  expect(layers[0].depositedLengthMm).toBe(0.5);
});

test("findings come in the order of the file, those about all of it first, and keep what is known of their place", () => {
  const findings = new Findings();
  findings.add("b", "warning", "second", { line: 9 });
  findings.add("a", "info", "whole file");
  findings.add("c", "warning", "first", { line: 2, layer: 1 });
  expect(findings.end()).toEqual([
    { code: "a", severity: "info", message: "whole file" },
    { code: "c", severity: "warning", message: "first", line: 2, layer: 1 },
    { code: "b", severity: "warning", message: "second", line: 9 },
  ]);
  expect(findings.count("b")).toBe(1);
  expect(findings.count("z")).toBe(0);
});
