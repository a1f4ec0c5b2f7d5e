import fc from "fast-check";
import { expect, test } from "vitest";
import { plainTuning } from "#tests/shared/prove/plain-tuning.ts";
import { bytesOf, failures, proveFiles, readBytes } from "#tests/shared/prove/proving.ts";
import { smallMachine, smallPart, smallProfile } from "#tests/shared/prove/small-part.ts";

const machine = smallMachine();
const profile = smallProfile();
const START = "G92 E0\n";

/** A line in the start script, where nothing is taken out: the two readers must take it for the same thing. */
async function readAlike(line: string): Promise<{ controls: number; failures: string[] }> {
  const original = smallPart().replace(START, `${START}${line}\n`);
  const reading = readBytes(bytesOf(original), machine);
  const tuned = plainTuning(original, machine, profile);
  const proof = await proveFiles({ original: bytesOf(original), tuned: bytesOf(tuned), machine, profile, reading });
  const own =
    reading.controls.filter(({ line: at }) => at === 11).length +
    reading.pauses.filter(({ line: at }) => at === 11).length;
  return { controls: own, failures: failures(proof).filter((failure) => failure.startsWith("readers-agree")) };
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
])("`%s` is taken for the same by both readers", async (line, controls) => {
  expect(await readAlike(line)).toEqual({ controls, failures: [] });
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
      // Two M commands on one line are a case of their own: see below.
      if ((text.replace(/;.*|\(.*?\)/g, "").match(/m/gi) ?? []).length < 2) expect(alike.failures).toEqual([]);
    }),
    { numRuns: Number(process.env.RUNS ?? 300) },
  );
});
