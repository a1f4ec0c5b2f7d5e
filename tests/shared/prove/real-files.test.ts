import { existsSync, readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { failures, proveFiles } from "#tests/shared/prove/proving.ts";
import { tuneBytes } from "#tests/shared/prove/real-tuning.ts";

const ROOT = new URL("../../../", import.meta.url);
const CORPUS = "../shared/corpus/toolpaths/";
const bytesIn = (path: string): Buffer => readFileSync(new URL(path, ROOT));
const jsonIn = (path: string): unknown => JSON.parse(bytesIn(path).toString("utf8"));
const toolpathsIn = (folder: string): string[] =>
  readdirSync(new URL(folder, ROOT)).filter((name) => name.endsWith(".gcode"));

const tern = parseMachine(jsonIn("samples/machines/tern.json"));
const fulmar = parseMachine(jsonIn("samples/machines/fulmar.json"));
const profile = (name: string) => parseProfile(jsonIn(`samples/profiles/${name}.json`));

async function expectProof(path: string, machine: typeof tern, profileName: string): Promise<void> {
  const original = bytesIn(path);
  const made = profile(profileName);
  const tuned = tuneBytes(original, machine, made);
  expect(failures(await proveFiles({ original, tuned, machine, profile: made }))).toEqual([]);
}

describe("the samples, tuned, pass", () => {
  test.each([
    ["mast-bracket", tern, "mast-bracket-stiff-foot-and-tough-post"],
    ["mast-bracket", tern, "mast-bracket-stiff-throughout"],
    ["valve-plate", tern, "valve-plate-flat-and-stiff"],
    ["seal-ring", tern, "seal-ring-stiff-base-and-tough-lip"],
    ["sensor-cap", fulmar, "sensor-cap-clear-dome"],
    ["sensor-cap", fulmar, "sensor-cap-even-cooling-pa-12"],
  ])("%s", { timeout: 60_000 }, (name, machine, profileName) =>
    expectProof(`samples/${name}.gcode`, machine, profileName),
  );
});

describe.skipIf(!existsSync(new URL(CORPUS, ROOT)))("toolpaths of all dialects, tuned, pass", () => {
  const names = existsSync(new URL(CORPUS, ROOT)) ? toolpathsIn(CORPUS) : [];
  test.each(names)("%s", { timeout: 60_000 }, (name) =>
    expectProof(CORPUS + name, tern, "seal-ring-stiff-base-and-tough-lip"),
  );
});
