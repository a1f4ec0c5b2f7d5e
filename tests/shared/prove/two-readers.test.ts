import fc from "fast-check";
import { expect, test } from "vitest";
import { plainTuning } from "#tests/shared/prove/plain-tuning.ts";
import { bytesOf, failures, proveFiles, readBytes } from "#tests/shared/prove/proving.ts";
import { smallMachine, smallPart, smallProfile } from "#tests/shared/prove/small-part.ts";

const profile = smallProfile();

/** A line at the end of the start script, where nothing is taken out: the two readers must take it for the same thing. */
async function readAlike(line: string, named = false): Promise<{ found: number; failures: string[] }> {
  const machine = smallMachine({ named });
  const original = smallPart({ named }).replace("G92 E0\n", `G92 E0\n${line}\n`);
  const reading = readBytes(bytesOf(original), machine);
  const tuned = plainTuning(original, machine, profile);
  const proof = await proveFiles({ original: bytesOf(original), tuned: bytesOf(tuned), machine, profile, reading });
  const found = [...reading.controls, ...reading.pauses].filter((control) => control.line === 11).length;
  return { found, failures: failures(proof).filter((failure) => failure.startsWith("readers-agree")) };
}

test.each<[string, number]>([
  ["M106 S255", 1],
  ["M106", 1],
  ["m106s128", 1],
  ["M0106 S1 2 8", 1],
  ["  M106   P0 S5", 1],
  ["M106 (half) S128", 1],
  ["(cooling) M106 S128", 1],
  ["(a (nested) comment) m107", 1],
  ["M106 S128 ; S255", 1],
  ["M106 P2 S0", 1],
  ["M106 P1 S9", 0],
  ["M106 P1.5 S9", 0],
  ["M106 P0 T45:50", 0],
  ["M106 L0.2 X0.9", 1],
  ["M106 S20 T2", 1],
  ["M106 S20 S30", 1],
  ["M106 S300", 1],
  ["M106 P S12", 1],
  ["M107 P2", 1],
  ["M42 P7 S255", 1],
  ["M42 S255", 0],
  ["M117 M106 S255", 0],
  ["M118 M107", 0],
  ["; M106 S255", 0],
  ["G4 P100", 0],
  ["G1 X5 M106 S9", 1],
  ["M0", 1],
  ["M0 wait for M106 S1", 1],
  ["M1", 1],
  ["M600", 1],
  ["M0600", 1],
  ["M25", 1],
  ["PAUSE", 1],
  ["pause", 1],
  ["@pause", 1],
  ["SET_PIN PIN=lamp VALUE=1", 0],
  ["M105", 0],
])("`%s` is taken for the same by both readers", async (line, found) => {
  expect(await readAlike(line)).toEqual({ found, failures: [] });
});

test.each<[string, number]>([
  ["SET_FAN_SPEED FAN=part SPEED=0.5", 1],
  ["set_fan_speed fan=PART speed=.5", 1],
  ['SET_FAN_SPEED FAN="part" SPEED="0.5"', 1],
  ["SET_FAN_SPEED SPEED=1 FAN=part ; all of it", 1],
  ["SET_FAN_SPEED FAN=part", 1],
  ["SET_FAN_SPEED FAN=part SPEED=half", 1],
  ["SET_FAN_SPEED FAN=other SPEED=1", 0],
  ["SET_FAN_SPEED", 0],
  ["SET_PIN PIN=lamp VALUE=0", 1],
  ["SET_PIN PIN=lamp VALUE=0.4 CYCLE_TIME=0.1", 1],
  ["  SET_PIN  PIN = lamp  VALUE = 0.4", 1],
  ["SET_PIN PIN=caselight VALUE=1", 0],
  ["M106 S128", 0],
  ["PAUSE REASON=filament", 1],
])("`%s` is taken for the same by both readers where outputs have names", async (line, found) => {
  expect(await readAlike(line, true)).toEqual({ found, failures: [] });
});

test("lines of all kinds of words are taken for the same by both readers", () => {
  const word = fc.oneof(
    fc.constantFrom("M106", "m106", "M107", "M42", "M0", "M600", "M117", "M104", "G1", "G4"),
    fc
      .tuple(fc.constantFrom(..."PSTFXLBsp"), fc.constantFrom("", "0", "1", "2", "7", "128", "0.5", ".5", "-1", "1e3"))
      .map(([a, b]) => a + b),
    fc.constantFrom("; S1", "(S2)", "*33"),
  );
  const line = fc
    .tuple(fc.array(word, { minLength: 1, maxLength: 5 }), fc.constantFrom("", " ", "\t"))
    .map(([words, gap]) => words.join(gap));
  return fc.assert(
    fc.asyncProperty(line, async (text) => {
      const alike = await readAlike(text);
      // Of several commands on a line firmware carries out one or all: such a file is passed only if both readers see it.
      if ((text.replace(/;.*|\(.*?\)/g, "").match(/m/gi) ?? []).length < 2) expect(alike.failures).toEqual([]);
    }),
    { numRuns: Number(process.env.RUNS ?? 300) },
  );
});
