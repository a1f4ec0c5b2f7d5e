import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { prepareTuning } from "#shared/rewrite/prepare-tuning.ts";
import { Rewriter } from "#shared/rewrite/rewriter.ts";
import { ENGINE, readBytes, sha256 } from "#tests/shared/prove/proving.ts";

/** The tuned file as the product writes it. */
export function tuneBytes(original: Uint8Array, machine: Machine, profile: Profile): Buffer {
  const reading = readBytes(original, machine);
  const { edits } = prepareTuning({ reading, machine, profile, digest: sha256, engine: ENGINE, status: "trial-only" });
  const pieces: Buffer[] = [];
  const rewriter = new Rewriter(edits, reading.file, (bytes) => pieces.push(Buffer.from(bytes)));
  rewriter.push(original);
  rewriter.end();
  return Buffer.concat(pieces);
}
