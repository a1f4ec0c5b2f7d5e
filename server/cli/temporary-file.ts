import { createHash, randomBytes } from "node:crypto";
import { closeSync, fsyncSync, openSync, readdirSync, renameSync, unlinkSync, writeSync } from "node:fs";
import { type FileHandle, open } from "node:fs/promises";
import { hostname } from "node:os";
import { basename, dirname, join } from "node:path";
import { errorCode } from "#server/cli/exit.ts";
import { obstacle } from "#server/cli/obstacle.ts";

/** `.OUT.quenchline-<pid>-<host and random>.part` */
const NAME = /^\..*\.quenchline-(\d+)-([0-9a-f]{4})[0-9a-f]{8}\.part$/s;
/** A folder may be shared between computers, and process numbers only mean something on their own. */
const HOST = createHash("sha256").update(hostname()).digest("hex").slice(0, 4);
/** Longest part of the target's name that is repeated, so that the whole stays below the 255 bytes of a file name. */
const NAME_CHARACTERS = 50;

const present = new Set<TemporaryFile>();

/**
 * A file on its way: written under a temporary name beside its target, and moved there complete or not at all. However
 * the process ends short of being killed outright, no temporary file stays; what a kill leaves is removed by the next run.
 */
export class TemporaryFile {
  readonly path: string;
  private readonly target: string;
  private readonly handle: FileHandle;
  private placed = false;

  private constructor(path: string, target: string, handle: FileHandle) {
    this.path = path;
    this.target = target;
    this.handle = handle;
  }

  /**
   * @param target absolute path it is going to have
   * @param mode permission bits of the file it replaces; those of a new file when left out
   */
  static async create(target: string, mode?: number): Promise<TemporaryFile> {
    const folder = dirname(target);
    guard();
    removeAbandoned(folder);
    const name = `.${basename(target).slice(0, NAME_CHARACTERS)}.quenchline-${process.pid}-${HOST}${randomBytes(4).toString("hex")}.part`;
    const path = join(folder, name);
    try {
      const file = new TemporaryFile(path, target, await open(path, "wx", mode === undefined ? 0o666 : mode & 0o777));
      present.add(file);
      // The process's mask took bits away. A disk without permission bits refuses, which does no harm.
      if (mode !== undefined) await file.handle.chmod(mode & 0o7777).catch(() => {});
      return file;
    } catch (error) {
      throw inTheWay(error, target);
    }
  }

  /** Writes at once, so that the caller may use its buffer again. */
  write(bytes: Uint8Array): void {
    try {
      for (let done = 0; done < bytes.length; ) done += writeSync(this.handle.fd, bytes, done);
    } catch (error) {
      throw inTheWay(error, this.target);
    }
  }

  /** Everything is on the disk, not just on its way there. */
  async finish(): Promise<void> {
    try {
      await this.handle.sync();
      await this.handle.close();
    } catch (error) {
      throw inTheWay(error, this.target);
    }
  }

  /** Moves a finished file to its target. */
  place(): void {
    try {
      renameSync(this.path, this.target);
    } catch (error) {
      throw inTheWay(error, this.target);
    }
    this.placed = true;
    present.delete(this);
    syncFolder(dirname(this.target));
  }

  /** Removes it, unless it is in place already. */
  async discard(): Promise<void> {
    await this.handle.close().catch(() => {});
    this.remove();
  }

  remove(): void {
    if (this.placed) return;
    present.delete(this);
    removeFile(this.path);
  }
}

function inTheWay(error: unknown, target: string): unknown {
  return obstacle(
    error,
    `in ${dirname(target)}`,
    "Make room, or name another folder. What stood there before is unchanged.",
  );
}

let guarding = false;

function guard(): void {
  if (guarding) return;
  guarding = true;
  const removeAll = () => {
    for (const file of present) file.remove();
  };
  process.on("exit", removeAll);
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"] as const)
    process.once(signal, () => {
      removeAll();
      // Without our listener the signal does what it does by default: whoever sent it sees that it worked.
      process.kill(process.pid, signal);
    });
  // Beyond a size limit of the shell this signal would end the process on the spot; so the write fails instead.
  process.on("SIGXFSZ", () => {});
}

/** Removes what killed runs on this computer have left in a folder. */
function removeAbandoned(folder: string): void {
  for (const name of listFolder(folder)) {
    const [, pid, host] = NAME.exec(name) ?? [];
    if (host === HOST && !isRunning(Number(pid))) removeFile(join(folder, name));
  }
}

/** A folder that can't be listed is no reason to stop; nor is one that isn't there, which is noticed soon enough. */
function listFolder(folder: string): string[] {
  try {
    return readdirSync(folder);
  } catch {
    return [];
  }
}

function isRunning(pid: number): boolean {
  try {
    return process.kill(pid, 0);
  } catch (error) {
    return errorCode(error) !== "ESRCH";
  }
}

function removeFile(path: string): void {
  try {
    unlinkSync(path);
  } catch {
    // Gone already.
  }
}

/** Makes a move last through a power cut. Not every system can do this for a folder. */
function syncFolder(folder: string): void {
  try {
    const descriptor = openSync(folder, "r");
    try {
      fsyncSync(descriptor);
    } finally {
      closeSync(descriptor);
    }
  } catch {
    // The move itself has succeeded.
  }
}
