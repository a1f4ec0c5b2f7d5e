import fc from "fast-check";
import { expect, test } from "vitest";
import { Refusal } from "#shared/refusal.ts";
import { bytesOf, failures, proveFiles } from "#tests/shared/prove/proving.ts";
import { Dice, randomMachine, randomPart, randomProfile } from "#tests/shared/prove/random-part.ts";
import { tuneBytes } from "#tests/shared/prove/real-tuning.ts";

/** A file that cannot be tuned, such as one that switches the lamp on in its end script, needs no proof. */
function tunedOrRefused(...input: Parameters<typeof tuneBytes>): Buffer | undefined {
  try {
    return tuneBytes(...input);
  } catch (error) {
    if (error instanceof Refusal) return undefined;
    throw error;
  }
}

test(
  "whatever the file, the machine and the profile: a tuned file passes, and so does it tuned again",
  () =>
    fc.assert(
      fc.asyncProperty(fc.nat(), async (seed) => {
        const dice = new Dice(seed);
        const original = bytesOf(randomPart(dice, ["M0", "M600"]));
        const machine = randomMachine(dice);
        const profile = randomProfile(dice);
        const tuned = tunedOrRefused(original, machine, profile);
        if (!tuned) return;
        expect(failures(await proveFiles({ original, tuned, machine, profile }))).toEqual([]);
        const again = tuneBytes(tuned, machine, profile);
        expect(failures(await proveFiles({ original: tuned, tuned: again, machine, profile }))).toEqual([]);
      }),
      { numRuns: Number(process.env.RUNS ?? 80) },
    ),
  600_000,
);
