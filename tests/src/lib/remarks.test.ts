import { expect, test } from "vitest";
import { findingRemarks, placedRemarks, remarksOf } from "#src/lib/remarks.ts";
import { layersOf } from "#tests/src/layer-log/layers.ts";

const FINDINGS = [
  { code: "a", severity: "warning" as const, layer: 2, message: "A" },
  { code: "b", severity: "info" as const, line: 34, message: "B" },
  { code: "c", severity: "info" as const, message: "C" },
];

test("findings stand at their layer, or at the layer that holds their line; those about the whole file nowhere", () => {
  const found = findingRemarks(FINDINGS, layersOf(5));
  expect(found).toEqual([
    { layer: 2, severity: "warning", message: "A" },
    { layer: 3, severity: "info", message: "B" },
    { severity: "info", message: "C" },
  ]);
  expect(placedRemarks(found).map(({ message }) => message)).toEqual(["A", "B"]);
});

test("before a file is written warnings come first, then advice, and what both say stands once; notes stay away", () => {
  const advice = [
    { layer: 4, code: "saturated", message: "D" },
    { layer: 5, code: "nozzle-below-melting", message: "E" },
    { layer: 1, code: "output-shared", message: "A" },
  ];
  expect(remarksOf(FINDINGS, advice, layersOf(5))).toEqual([
    { layer: 2, severity: "warning", message: "A" },
    { layer: 5, severity: "warning", message: "E" },
    { layer: 4, severity: "advice", message: "D" },
  ]);
});
