import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { parsePolymer } from "#shared/formats/polymer.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { everywhere, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

const card = (name: string) =>
  parsePolymer(JSON.parse(readFileSync(new URL(`../../../samples/polymers/${name}.json`, import.meta.url), "utf8")));

const adviceFor = (nozzleC: number | null | undefined, name = "peek") =>
  planDuties({
    layers: layersOf(3, () => ({ nozzleC })),
    machine: machineWith(),
    profile: { ...profileWith(everywhere(fixed("part-fan", 0.3))), polymer: card(name).name },
    polymer: card(name),
  }).advice;

test("a nozzle below the melting temperature says that the file was not sliced for the polymer", () => {
  const [advice] = adviceFor(220);
  expect(advice).toMatchObject({ layer: 1, code: "nozzle-below-melting" });
  expect(advice.message).toContain("220 °C, below the melting temperature of PEEK, 343 °C");
  expect(adviceFor(400)).toEqual([]);
  expect(adviceFor(220, "pa-12")).toEqual([]);
});

test("a nozzle that the file says nothing of is told, and layers that know nothing of it are not", () => {
  expect(adviceFor(null)).toMatchObject([{ code: "nozzle-unknown" }]);
  expect(adviceFor(undefined)).toEqual([]);
});
