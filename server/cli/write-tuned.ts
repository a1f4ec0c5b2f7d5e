import { GzipSink } from "#server/cli/gzip-sink.ts";
import type { ToolpathInput } from "#server/cli/input-stream.ts";
import { Progress } from "#server/cli/progress.ts";
import type { TemporaryFile } from "#server/cli/temporary-file.ts";
import type { FileFacts } from "#shared/layers/reading.ts";
import type { Edit } from "#shared/rewrite/edits.ts";
import { Rewriter } from "#shared/rewrite/rewriter.ts";

/** Second pass: the input with its edits goes into a temporary file, packed as gzip where that is wanted. */
export async function writeTuned(
  input: ToolpathInput,
  edits: readonly Edit[],
  file: FileFacts,
  to: TemporaryFile,
  packed: boolean,
): Promise<void> {
  const gzip = packed ? new GzipSink((bytes) => to.write(bytes)) : undefined;
  const rewriter = new Rewriter(edits, file, (bytes) => (gzip ?? to).write(bytes));
  const progress = new Progress("writing the tuned file", input.storedBytes);
  try {
    for await (const chunk of input.chunks()) {
      rewriter.push(chunk);
      await gzip?.ready();
      progress.show(input.readBytes);
    }
    rewriter.end();
    await gzip?.end();
    await to.finish();
  } finally {
    progress.end();
  }
}
