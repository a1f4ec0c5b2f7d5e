import { describe, expect, test, vi } from "vitest";
import { plainTuning } from "#tests/shared/prove/plain-tuning.ts";
import { bytesOf, failures, proveFiles, readBytes } from "#tests/shared/prove/proving.ts";
import { type Dialect, smallMachine, smallPart, smallProfile } from "#tests/shared/prove/small-part.ts";
import { provenanceTamperings, resealedTamperings, type Tampering, tamperings } from "#tests/shared/prove/tampering.ts";

// Thousands of proofs in one test.
vi.setConfig({ testTimeout: 120_000 });

/** One in `every` tamperings is tried; all of them with TRY_ALL=1. */
type Case = Dialect & { withinLayer?: "replace" | "keep-raises"; every?: number };

const CASES: [string, Case][] = [
  ["line feeds", {}],
  ["carriage returns and line feeds", { newline: "\r\n", every: 3 }],
  ["carriage returns alone", { newline: "\r", every: 7 }],
  ["numbered", { numbered: true, every: 3 }],
  ["numbered, with carriage returns", { numbered: true, newline: "\r\n", withinLayer: "keep-raises", every: 7 }],
  ["no final line end", { finalNewline: false, every: 7 }],
  ["no final line end, and our line is the last", { finalNewline: false, bareEnd: true, every: 3 }],
  ["a byte order mark", { byteOrderMark: true, every: 7 }],
  ["raises kept", { withinLayer: "keep-raises", every: 3 }],
  ["a blocking pause", { pause: "M0", every: 7 }],
  ["a pause that does not block", { pause: "M600", every: 7 }],
  ["named outputs", { named: true, withinLayer: "keep-raises", every: 7 }],
];

describe.each(CASES)("%s", (_, { withinLayer = "replace", every = 1, ...dialect }) => {
  const machine = smallMachine(dialect);
  const profile = smallProfile({ withinLayer });
  const original = smallPart(dialect);
  const tuned = plainTuning(original, machine, profile);
  const reading = readBytes(bytesOf(original), machine);

  // Nothing but the files and documents is known, as on the command line: the seal has to show the rest.
  const proofOf = (text: string) =>
    proveFiles({ original: bytesOf(original), tuned: bytesOf(text), machine, profile, reading, expected: {} });

  const missed = async (list: readonly Tampering[]): Promise<string[]> => {
    const names: string[] = [];
    for (const tampering of list) if ((await proofOf(tampering.tuned)).passed) names.push(tampering.name);
    return names;
  };

  test("the tuned file as it was written passes", async () => {
    expect(failures(await proofOf(tuned))).toEqual([]);
  });

  const spread = (list: Tampering[]): Tampering[] =>
    list.filter((_, k) => process.env.TRY_ALL !== undefined || k % every === 0);

  const single = spread(tamperings(tuned, dialect.numbered === true));
  test(`all ${single.length} tamperings with a single line are caught`, async () => {
    expect(await missed(single)).toEqual([]);
  });

  const resealed = resealedTamperings(original, tuned, machine, profile);
  test(`all ${resealed.length} tamperings with a line of ours are caught though the seal fits`, async () => {
    expect(await missed(resealed)).toEqual([]);
  });

  const provenance = spread(provenanceTamperings(tuned));
  test(`all ${provenance.length} changes of one character of the provenance line are caught`, async () => {
    expect(await missed(provenance)).toEqual([]);
  });
});
