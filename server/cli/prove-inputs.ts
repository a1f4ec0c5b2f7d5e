import { createHash } from "node:crypto";
import { documentDigest } from "#server/cli/documents.ts";
import { InputRefused } from "#server/cli/exit.ts";
import type { ToolpathInput } from "#server/cli/input-stream.ts";
import { Progress } from "#server/cli/progress.ts";
import { version } from "#server/cli/version.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { ProofDocument } from "#shared/formats/proof.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { type ProveInput, prove } from "#shared/prove/prove.ts";
import { Refusal } from "#shared/refusal.ts";

interface Pair {
  original: ToolpathInput;
  tuned: ToolpathInput;
  /** of the original */
  reading: Reading;
  machine: Machine;
  profile?: Profile;
  polymer?: Polymer;
  expected?: ProveInput["expected"];
}

/** Third pass: reads both toolpaths side by side and proves that one is the other, tuned. */
export async function proveInputs({ original, tuned, ...facts }: Pair): Promise<ProofDocument> {
  const progress = new Progress("proving the tuned file", tuned.storedBytes);
  const [input, output] = [new Hashed(original), new Hashed(tuned, () => progress.show(tuned.readBytes))];
  try {
    return await prove({
      ...facts,
      original: input.chunks(),
      tuned: output.chunks(),
      digest: documentDigest,
      hashes: () => ({ input: input.digest(), output: output.digest() }),
      engine: version,
    });
  } finally {
    progress.end();
  }
}

/** An input that is hashed as it is read. */
class Hashed {
  private readonly input: ToolpathInput;
  private readonly onChunk: () => void;
  private readonly hash = createHash("sha256");
  private bytes = 0;

  constructor(input: ToolpathInput, onChunk = () => {}) {
    this.input = input;
    this.onChunk = onChunk;
  }

  async *chunks(): AsyncGenerator<Uint8Array, void, undefined> {
    try {
      for await (const chunk of this.input.chunks()) {
        this.hash.update(chunk);
        this.bytes += chunk.length;
        this.onChunk();
        yield chunk;
      }
    } catch (error) {
      throw error instanceof Refusal ? new InputRefused(error, this.input.name) : error;
    }
  }

  digest(): { sha256: string; bytes: number } {
    return { sha256: this.hash.digest("hex"), bytes: this.bytes };
  }
}
