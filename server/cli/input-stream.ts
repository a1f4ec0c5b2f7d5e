import { type FileHandle, open } from "node:fs/promises";
import { callerPath } from "#server/cli/caller-path.ts";
import { aboutFile } from "#server/cli/exit.ts";
import { gunzipped, isGzip } from "#server/cli/gunzipped.ts";
import { spool } from "#server/cli/spool.ts";
import { unreadable } from "#server/cli/unreadable.ts";
import { Refusal } from "#shared/refusal.ts";

const CHUNK_BYTES = 512 * 1024;
/** The largest toolpath that is read, unpacked: 4 GiB. It keeps a crafted gzip file from running for hours. */
export const MAX_TOOLPATH_BYTES = 4 * 2 ** 30;

/** How often an input is read: a pipe that is needed more than once is put on disk first. */
export type Passes = "once" | "several times";

/**
 * A toolpath as a stream of bytes, gzip already unpacked. Its file is opened once, so every pass reads the same file
 * even if another is put in its place meanwhile.
 */
export class ToolpathInput {
  /** as the caller wrote it; `-` is standard input */
  readonly name: string;
  /** as stored, packed or not; undefined where it is not known in advance */
  readonly storedBytes: number | undefined;
  /** stored bytes read in this pass, for progress */
  readBytes = 0;
  private readonly handle: FileHandle | undefined;

  private constructor(name: string, handle: FileHandle | undefined, storedBytes: number | undefined) {
    this.name = name;
    this.handle = handle;
    this.storedBytes = storedBytes;
  }

  /** @throws InputRefused when it can't be read */
  static open(name: string, passes: Passes): Promise<ToolpathInput> {
    return aboutFile(name, async () => {
      if (name === "-" && passes === "once") return new ToolpathInput(name, undefined, undefined);
      const handle = name === "-" ? await spool(process.stdin, MAX_TOOLPATH_BYTES) : await openFile(name, passes);
      const stat = await handle.stat();
      return new ToolpathInput(name, handle, stat.isFile() ? stat.size : undefined);
    });
  }

  /** Whether it is stored as gzip, by its first bytes. */
  async isPacked(): Promise<boolean> {
    if (this.handle === undefined) return false;
    const { buffer } = await this.handle.read(new Uint8Array(2), 0, 2, 0);
    return isGzip(buffer);
  }

  /**
   * One pass over the unpacked bytes. A chunk is overwritten once the next one is asked for.
   *
   * @throws Refusal when the gzip is broken or the toolpath too large
   */
  async *chunks(): AsyncGenerator<Uint8Array, void, undefined> {
    this.readBytes = 0;
    let bytes = 0;
    for await (const chunk of this.unpacked()) {
      bytes += chunk.length;
      if (bytes > MAX_TOOLPATH_BYTES) throw tooLarge();
      yield chunk;
    }
  }

  async close(): Promise<void> {
    await this.handle?.close();
  }

  private async *unpacked(): AsyncGenerator<Uint8Array, void, undefined> {
    const stored = this.stored();
    const { value: head = new Uint8Array(0) } = await stored.next();
    if (isGzip(head) || /\.gz$/i.test(this.name)) yield* gunzipped(head, stored);
    else if ((this.storedBytes ?? 0) > MAX_TOOLPATH_BYTES) throw tooLarge();
    else {
      yield head;
      yield* stored;
    }
  }

  private async *stored(): AsyncGenerator<Uint8Array, void, undefined> {
    const { handle } = this;
    const source = handle ? fileChunks(handle, this.storedBytes !== undefined) : process.stdin;
    for await (const chunk of source) {
      this.readBytes += chunk.length;
      yield chunk;
    }
  }
}

async function openFile(name: string, passes: Passes): Promise<FileHandle> {
  try {
    const handle = await open(callerPath(name));
    const stat = await handle.stat();
    if (stat.isFile() || (passes === "once" && !stat.isDirectory())) return handle;
    // A pipe with a name can't be read twice; a folder fails here, with the right reason.
    return await spool(handle.createReadStream(), MAX_TOOLPATH_BYTES);
  } catch (error) {
    throw unreadable(error, "the toolpath");
  }
}

/** The bytes of a file. Two buffers take turns: while one is looked at the other is being filled. */
export async function* fileChunks(handle: FileHandle, seekable: boolean): AsyncGenerator<Uint8Array, void, undefined> {
  const buffers = [new Uint8Array(CHUNK_BYTES), new Uint8Array(CHUNK_BYTES)];
  let position = 0;
  const fill = (buffer: Uint8Array) => handle.read(buffer, 0, buffer.length, seekable ? position : null);
  let filling = fill(buffers[0]);
  try {
    for (let turn = 1; ; turn = 1 - turn) {
      const { bytesRead, buffer } = await filling;
      if (bytesRead === 0) return;
      position += bytesRead;
      filling = fill(buffers[turn]);
      yield buffer.subarray(0, bytesRead);
    }
  } catch (error) {
    throw unreadable(error, "the toolpath");
  } finally {
    // The handle must not be closed under a read; its error, if any, was thrown above or nobody waits for it.
    await filling.catch(() => {});
  }
}

function tooLarge(): Refusal {
  return new Refusal(
    "too-large",
    `the toolpath is larger than ${MAX_TOOLPATH_BYTES / 2 ** 30} GiB unpacked`,
    "Check that it is the right file; slice the part in pieces if it really is that large.",
  );
}
