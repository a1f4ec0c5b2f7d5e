import { createHash, randomBytes } from "node:crypto";
import type { Stats } from "node:fs";
import { type FileHandle, mkdir, open, readdir, rename, rm, stat } from "node:fs/promises";
import { join } from "node:path";
import type { Readable } from "node:stream";
import { errorCode } from "#server/cli/exit.ts";
import { type ByteRange, BytesMissing, type Staged, type Storage } from "#server/storage/storage.ts";

/** Bytes are handed out in pieces of this size, and gathered to this size before they are written. */
const PIECE_BYTES = 512 * 1024;
const INCOMING = "incoming";
const SHA256 = /^[0-9a-f]{64}$/;

/**
 * A folder of files named after their SHA-256, spread over 256 subfolders; what is on its way stands in `incoming/`.
 * One server owns the folder; its workers may use it at the same time.
 */
export class LocalStorage implements Storage {
  private readonly root: string;

  private constructor(root: string) {
    this.root = root;
  }

  /** Opens the folder for the server itself, which alone may remove what an earlier run left half done. */
  static async open(root: string): Promise<LocalStorage> {
    await rm(join(root, INCOMING), { recursive: true, force: true });
    await mkdir(join(root, INCOMING), { recursive: true, mode: 0o700 });
    return new LocalStorage(root);
  }

  /** The same folder as seen by a worker of the server that opened it. */
  static share(root: string): LocalStorage {
    return new LocalStorage(root);
  }

  async stage(bytes: AsyncIterable<Uint8Array>, owner: string): Promise<Staged> {
    const name = `${owner}.${randomBytes(8).toString("hex")}.part`;
    const path = this.incoming(name);
    const handle = await open(path, "wx", 0o600);
    try {
      const written = await writeAll(handle, bytes);
      await handle.sync();
      await handle.close();
      return { name, ...written };
    } catch (error) {
      await handle.close().catch(() => {});
      await rm(path, { force: true });
      throw error;
    }
  }

  async openStaged({ name }: Staged): Promise<Readable> {
    return readStream(await open(this.incoming(name)));
  }

  async keep({ name, sha256 }: Staged): Promise<void> {
    if (await this.has(sha256)) return this.discard({ name });
    await mkdir(this.folder(sha256), { recursive: true, mode: 0o700 });
    await rename(this.incoming(name), this.path(sha256));
    await syncFolder(this.folder(sha256));
  }

  async discard({ name }: Pick<Staged, "name">): Promise<void> {
    await rm(this.incoming(name), { force: true });
  }

  async discardOf(owner: string): Promise<void> {
    for (const name of await readdir(join(this.root, INCOMING)))
      if (name.startsWith(`${owner}.`)) await this.discard({ name });
  }

  async open(sha256: string, range?: ByteRange): Promise<Readable> {
    try {
      return readStream(await open(this.path(sha256)), range);
    } catch (error) {
      throw errorCode(error) === "ENOENT" ? new BytesMissing(sha256) : error;
    }
  }

  async has(sha256: string): Promise<boolean> {
    return (await this.find(sha256)) !== undefined;
  }

  async size(sha256: string): Promise<number> {
    const found = await this.find(sha256);
    if (found === undefined) throw new BytesMissing(sha256);
    return found.size;
  }

  async remove(sha256: string): Promise<void> {
    await rm(this.path(sha256), { force: true });
  }

  async *list(): AsyncGenerator<string, void, undefined> {
    for (const folder of await readdir(this.root, { withFileTypes: true })) {
      if (!folder.isDirectory() || !/^[0-9a-f]{2}$/.test(folder.name)) continue;
      for (const name of await readdir(join(this.root, folder.name))) if (SHA256.test(name)) yield name;
    }
  }

  private async find(sha256: string): Promise<Stats | undefined> {
    try {
      return await stat(this.path(sha256));
    } catch (error) {
      if (errorCode(error) === "ENOENT") return undefined;
      throw error;
    }
  }

  private incoming(name: string): string {
    return join(this.root, INCOMING, name);
  }

  private folder(sha256: string): string {
    return join(this.root, sha256.slice(0, 2));
  }

  /** A hash comes from a row, never from a request; a slip must still not reach outside the folder. */
  private path(sha256: string): string {
    if (!SHA256.test(sha256)) throw new Error(`${sha256} is no SHA-256`);
    return join(this.folder(sha256), sha256);
  }
}

function readStream(handle: FileHandle, range: Partial<ByteRange> = {}): Readable {
  return handle.createReadStream({ ...range, highWaterMark: PIECE_BYTES });
}

async function writeAll(handle: FileHandle, chunks: AsyncIterable<Uint8Array>): Promise<Omit<Staged, "name">> {
  const hash = createHash("sha256");
  let bytes = 0;
  let held: Uint8Array[] = [];
  let heldBytes = 0;
  const flush = async () => {
    const pieces = held;
    held = [];
    heldBytes = 0;
    await writePieces(handle, pieces);
  };
  for await (const chunk of chunks) {
    hash.update(chunk);
    bytes += chunk.length;
    held.push(chunk);
    heldBytes += chunk.length;
    if (heldBytes >= PIECE_BYTES) await flush();
  }
  await flush();
  return { sha256: hash.digest("hex"), bytes };
}

/** A disk that is nearly full takes part of what it is given, and refuses with a reason only the next time. */
async function writePieces(handle: FileHandle, pieces: Uint8Array[]): Promise<void> {
  if (pieces.length === 0) return;
  const total = pieces.reduce((sum, { length }) => sum + length, 0);
  const { bytesWritten } = await handle.writev(pieces);
  if (bytesWritten === total) return;
  const rest = Buffer.concat(pieces).subarray(bytesWritten);
  for (let done = 0; done < rest.length; ) done += (await handle.write(rest, done)).bytesWritten;
}

/** Makes a move last through a power cut. Not every system can do this for a folder. */
async function syncFolder(path: string): Promise<void> {
  const handle = await open(path).catch(() => undefined);
  await handle?.sync().catch(() => {});
  await handle?.close();
}
