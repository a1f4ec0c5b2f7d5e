import { describe, expect, test, vi } from "vitest";
import { bytesOf, failures, proveFiles, readBytes } from "#tests/shared/prove/proving.ts";
import { tuneBytes } from "#tests/shared/prove/real-tuning.ts";
import { smallMachine, smallPart, smallProfile } from "#tests/shared/prove/small-part.ts";
import { resealedTamperings } from "#tests/shared/prove/tampering.ts";

vi.setConfig({ testTimeout: 60_000 });

const RATES = [0.05, 0.02];
const LEADS = [0, "settle", 6];

describe.each(RATES.flatMap((rate) => LEADS.map((lead) => [rate, lead])))(
  "a lamp at %s a second, lead %s",
  (rate, lead) => {
    const machine = smallMachine({ lamp: { maxDutyPerS: rate, settleS: 3 } });
    const profile = smallProfile({ lead: { lamp: lead } });
    const original = smallPart({ slow: true });
    const tuned = tuneBytes(bytesOf(original), machine, profile).toString("latin1");
    const reading = readBytes(bytesOf(original), machine);
    const proofOf = (text: string) =>
      proveFiles({ original: bytesOf(original), tuned: bytesOf(text), machine, profile, reading });

    test("its staircases pass", async () => {
      expect(tuned.match(/M106 P2 S\d+ ;ql/g)!.length).toBeGreaterThan(12);
      expect(failures(await proofOf(tuned))).toEqual([]);
    });

    const list = resealedTamperings(original, tuned, machine, profile);
    test(`all ${list.length} steps left out, set otherwise or moved are caught though the seal fits`, async () => {
      const missed: string[] = [];
      for (const { name, tuned: text } of list) if ((await proofOf(text)).passed) missed.push(name);
      expect(missed).toEqual([]);
    });
  },
);
