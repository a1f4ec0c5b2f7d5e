import { createHash } from "node:crypto";
import { aboutFile } from "#server/cli/exit.ts";
import type { ToolpathInput } from "#server/cli/input-stream.ts";
import { Progress } from "#server/cli/progress.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import type { Reading } from "#shared/layers/reading.ts";

/**
 * Reads and times a toolpath in one pass. Its digest is of the unpacked bytes: a toolpath is the same one packed or not.
 *
 * @throws InputRefused naming the file and the line
 */
export function readInput(input: ToolpathInput, machine: Machine): Promise<Reading> {
  return aboutFile(input.name, async () => {
    const reader = new ToolpathReader(machine);
    const hash = createHash("sha256");
    const progress = new Progress(`reading ${input.name}`, input.storedBytes);
    try {
      for await (const chunk of input.chunks()) {
        hash.update(chunk);
        reader.push(chunk);
        progress.show(input.readBytes, reader.progress.layers);
      }
    } finally {
      progress.end();
    }
    return reader.end(hash.digest("hex"));
  });
}
