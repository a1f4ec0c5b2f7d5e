import { createHash } from "node:crypto";
import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { ProofDocument } from "#shared/formats/proof.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { type ProveInput, prove } from "#shared/prove/prove.ts";

export const ENGINE = "0.0.0-test";

export const sha256 = (data: Uint8Array | string): string => createHash("sha256").update(data).digest("hex");

/** Text as bytes, one a character. */
export const bytesOf = (text: string): Buffer => Buffer.from(text, "latin1");

export function readBytes(bytes: Uint8Array, machine: Machine): Reading {
  const reader = new ToolpathReader(machine);
  reader.push(bytes);
  return reader.end(sha256(bytes));
}

/** The bytes in chunks of this size. */
export async function* chunksOf(bytes: Uint8Array, size: number): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.subarray(at, at + size);
}

export interface Files {
  original: Uint8Array;
  tuned: Uint8Array;
  machine: Machine;
  profile?: Profile;
  reading?: Reading;
  chunk?: number;
  expected?: ProveInput["expected"];
}

export function proveFiles({
  original,
  tuned,
  machine,
  profile,
  chunk = 1 << 16,
  ...rest
}: Files): Promise<ProofDocument> {
  return prove({
    original: chunksOf(original, chunk),
    tuned: chunksOf(tuned, chunk),
    reading: rest.reading ?? readBytes(original, machine),
    machine,
    profile,
    digest: sha256,
    engine: ENGINE,
    hashes: () => ({
      input: { sha256: sha256(original), bytes: original.length },
      output: { sha256: sha256(tuned), bytes: tuned.length },
    }),
    expected: rest.expected ?? { engine: ENGINE, status: "trial-only" },
  });
}

/** Ids and details of the checks that failed. */
export const failures = ({ checks }: ProofDocument): string[] =>
  checks.filter(({ passed }) => !passed).map(({ id, detail }) => `${id}: ${detail}`);
