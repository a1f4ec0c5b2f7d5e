import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { SAMPLES } from "#samples/generate/samples.ts";

const FOLDER = new URL("../../samples/", import.meta.url);
const fileNames = readdirSync(FOLDER).filter((name) => name.endsWith(".gcode"));
const readLines = (name: string) => readFileSync(new URL(name, FOLDER), "latin1").split(/\r?\n/);

test("every toolpath in the folder comes from the generator, and every one it makes is there", () => {
  expect(fileNames.sort()).toEqual(Object.keys(SAMPLES).sort());
});

describe.each(Object.entries(SAMPLES))("%s", (name, generate) => {
  test("is, byte for byte, what the generator writes; `npx tsx samples/generate/write-samples.ts` brings it up to date", () => {
    const bytes = readFileSync(new URL(name, FOLDER));
    expect(bytes.equals(Buffer.from(generate(), "latin1"))).toBe(true);
  });

  test("never switches the lamp on", () => {
    const lamp = readLines(name).filter((line) => /M106 P2\b|PIN=halogen/i.test(line));
    for (const line of lamp) expect(line).toMatch(/(S0|VALUE=0)$/i);
  });

  test("heats up and waits before the first extruding move, and ends with everything off", () => {
    const lines = readLines(name).map((line) => line.replace(/^N\d+ |\*\d+$/g, "").toUpperCase());
    const firstBead = lines.findIndex((line) => /^G[123] .*X.*E\d/.test(line));
    for (const wait of ["M190 S", "M109 S"]) {
      const at = lines.findIndex((line) => line.startsWith(wait));
      expect(at).toBeGreaterThan(-1);
      expect(at).toBeLessThan(firstBead);
    }
    const ending = lines.slice(-10);
    for (const off of [/^M104 S0$/, /^M140 S0$/, /^(M107( P0)?|SET_FAN_SPEED .* SPEED=0)$/]) {
      expect(ending.filter((line) => off.test(line))).toHaveLength(1);
    }
  });
});

test("the numbered file counts from 1 without a gap, and every checksum is right", () => {
  const numbered = readLines("valve-plate.gcode").filter((line) => line.startsWith("N"));
  numbered.forEach((line, index) => {
    const [, number, sum] = line.match(/^N(\d+) .*\*(\d+)$/)!;
    const bytes = [...line.slice(0, line.lastIndexOf("*"))].map((character) => character.charCodeAt(0));
    if (Number(number) !== index + 1 || bytes.reduce((xor, byte) => xor ^ byte, 0) !== Number(sum)) {
      throw new Error(`line ${index + 1} is ${line}`);
    }
  });
  expect(numbered.length).toBeGreaterThan(10_000);
});

test("the README has a line for every file", () => {
  const readme = readFileSync(new URL("README.md", FOLDER), "utf8");
  const documents = ["machines", "polymers", "profiles"].flatMap((folder) => readdirSync(new URL(folder, FOLDER)));
  for (const name of [...fileNames, ...documents]) expect(readme).toContain(name);
});
