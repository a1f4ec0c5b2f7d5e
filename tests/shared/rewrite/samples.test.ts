import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { isOwn, linesOf, ownCommands, tuneWhole, unnumbered } from "#tests/shared/rewrite/tuning.ts";

const sample = (name: string): string => readFileSync(new URL(`../../../samples/${name}`, import.meta.url), "latin1");
const document = (name: string): unknown => JSON.parse(sample(name));

describe.each([
  ["mast-bracket", "tern", "mast-bracket-stiff-foot-and-tough-post"],
  ["mast-bracket", "tern", "mast-bracket-stiff-throughout"],
  ["valve-plate", "tern", "valve-plate-flat-and-stiff"],
  ["seal-ring", "tern", "seal-ring-stiff-base-and-tough-lip"],
  ["sensor-cap", "fulmar", "sensor-cap-clear-dome"],
])("%s on %s by %s", (file, machineName, profileName) => {
  const machine = parseMachine(document(`machines/${machineName}.json`));
  const profile = parseProfile(document(`profiles/${profileName}.json`));
  const text = sample(`${file}.gcode`);
  const { reading, text: tuned, plan } = tuneWhole(text, machine, profile);
  const again = tuneWhole(tuned, machine, profile, { cut: [65_536, 1, 999] });

  test("gives the same bytes when tuned again", () => {
    expect(again.text === tuned).toBe(true);
    expect(again.plan.layers).toEqual(plan.layers);
  });

  test("keeps every line but those of the driven channels, and every layer's time", () => {
    const gone = new Set(
      reading.controls.filter(({ layer }) => layer >= 1 && Number.isFinite(layer)).map(({ line }) => line),
    );
    const seen = (lines: string[]) => (reading.file.numbered ? lines.map(unnumbered) : lines);
    const kept = seen(linesOf(tuned).filter((line) => !isOwn(line)));
    const before = seen(linesOf(text));
    let next = 0;
    const missing = before.filter((line, k) => {
      if (kept[next] !== line) return !gone.has(k + 1);
      next++;
      return false;
    });
    expect(missing).toEqual([]);
    expect(next).toBe(kept.length);
    expect(again.reading.layers.map(({ timeS }) => timeS)).toEqual(reading.layers.map(({ timeS }) => timeS));
  });

  test("ends with the lamp off, and lights it in between", () => {
    const lamp = machine.channels[1];
    const commands = again.reading.controls.filter(({ channel, ours }) => channel === 1 && ours);
    expect(commands[commands.length - 1].duty).toBe(0);
    expect(Math.max(...commands.map(({ duty }) => duty))).toBeGreaterThan(0.05);
    expect(Math.max(...commands.map(({ duty }) => duty))).toBeLessThanOrEqual(lamp.maxDuty);
    expect(ownCommands(tuned).length).toBeGreaterThan(plan.layers.length / 10);
  });
});
