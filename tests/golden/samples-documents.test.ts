import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { checkFit } from "#shared/formats/fit.ts";
import { parseMachine } from "#shared/formats/machine.ts";
import { parsePolymer } from "#shared/formats/polymer.ts";
import { parseProfile } from "#shared/formats/profile.ts";

const SAMPLES = new URL("../../samples/", import.meta.url);

const readJson = (path: string): unknown => JSON.parse(readFileSync(new URL(path, SAMPLES), "utf8"));
const documents = (folder: string) => readdirSync(new URL(folder, SAMPLES)).map((name) => `${folder}/${name}`);

const machines = documents("machines").map((path) => parseMachine(readJson(path)));
const polymers = documents("polymers").map((path) => parsePolymer(readJson(path)));
const profiles = documents("profiles").map((path) => ({ path, profile: parseProfile(readJson(path)) }));

/** Which machine each part is sliced for, by the beginning of its profiles' file names. */
const MACHINE_OF = { "mast-bracket": "Tern", "valve-plate": "Tern", "seal-ring": "Tern", "sensor-cap": "Fulmar" };

test("the demo's machines and polymers are all there, and read without a problem", () => {
  expect(machines.map(({ name }) => name)).toEqual(["Fulmar", "Tern"]);
  expect(polymers.map(({ name }) => name)).toEqual([
    "PA 12",
    "PA 6",
    "PEEK",
    "PEI",
    "PEKK 60/40",
    "PEKK 80/20",
    "PP",
    "PPS",
  ]);
});

test("every part has a profile", () => {
  const parts = profiles.map(({ path }) =>
    Object.keys(MACHINE_OF).find((part) => path.startsWith(`profiles/${part}-`)),
  );
  expect(new Set(parts)).toEqual(new Set(Object.keys(MACHINE_OF)));
});

describe.each(profiles)("$path", ({ path, profile }) => {
  test("fits its part's machine and the polymer it names", () => {
    const [, machineName] = Object.entries(MACHINE_OF).find(([part]) => path.startsWith(`profiles/${part}-`))!;
    const machine = machines.find(({ name }) => name === machineName)!;
    const polymer = polymers.find(({ name }) => name === profile.polymer)!;
    expect(polymer).toBeDefined();
    expect(() => checkFit(machine, profile, polymer)).not.toThrow();
  });

  test("ends with the lamp stepped down or off", () => {
    const heating = profile.zones.at(-1)!.heating;
    for (const rule of heating) {
      const off = rule.rule === "fixed" && rule.duty === 0;
      expect(off || (profile.limits[rule.channel]?.endRampMm ?? 0) > 0).toBe(true);
    }
  });
});

test("between them the profiles use every unit, every rule, every quantity a curve runs over and both answers to raises", () => {
  const zones = profiles.flatMap(({ profile }) => profile.zones);
  const rules = zones.flatMap((zone) => [...zone.cooling, ...zone.heating]);
  expect(new Set(zones.map(({ unit }) => unit))).toEqual(new Set(["mm", "layer", "fraction"]));
  expect(new Set(rules.map(({ rule }) => rule))).toEqual(new Set(["fixed", "curve", "hold"]));
  const over = rules.flatMap((rule) => (rule.rule === "curve" ? [rule.over] : []));
  expect(new Set(over)).toEqual(new Set(["layer-time", "deposited-length", "height"]));
  expect(new Set(profiles.map(({ profile }) => profile.withinLayer))).toEqual(new Set(["replace", "keep-raises"]));
});

test("a number that is only remembered or assumed never claims to be published", () => {
  for (const { source, confidence } of sourcedNumbers(polymers)) {
    if (/^(value )?from memory|assumed|working (limit|margin)/.test(source)) expect(confidence).toBe("unverified");
  }
});

function sourcedNumbers(value: unknown): { source: string; confidence: string }[] {
  if (typeof value !== "object" || value === null) return [];
  if ("source" in value && "confidence" in value) return [value as { source: string; confidence: string }];
  return Object.values(value).flatMap(sourcedNumbers);
}
