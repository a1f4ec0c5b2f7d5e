import { randomBytes } from "node:crypto";
import { type FileHandle, open, unlink } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { obstacle } from "#server/cli/obstacle.ts";
import { Refusal } from "#shared/refusal.ts";

/**
 * Puts a stream on disk, to be read as often as needed. The file loses its name at once: however this process ends,
 * nothing is left of it.
 */
export async function spool(source: AsyncIterable<Uint8Array>, mostBytes: number): Promise<FileHandle> {
  const folder = tmpdir();
  const path = join(folder, `quenchline-${process.pid}-${randomBytes(8).toString("hex")}`);
  let handle: FileHandle | undefined;
  try {
    handle = await open(path, "wx+", 0o600);
    await unlink(path);
    await fill(handle, source, mostBytes);
    return handle;
  } catch (error) {
    await handle?.close();
    throw obstacle(error, `in ${folder}`, "Set TMPDIR to a folder with more room.");
  }
}

async function fill(handle: FileHandle, source: AsyncIterable<Uint8Array>, mostBytes: number): Promise<void> {
  let position = 0;
  for await (const chunk of source) {
    for (let done = 0; done < chunk.length; ) {
      const { bytesWritten } = await handle.write(chunk, done, chunk.length - done, position);
      done += bytesWritten;
      position += bytesWritten;
    }
    if (position > mostBytes)
      throw new Refusal(
        "too-large",
        `more than ${mostBytes / 2 ** 30} GiB came in`,
        "Check that the right file is sent; give it as a file.",
      );
  }
}
