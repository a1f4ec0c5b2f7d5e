import { linkSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";

/** Another process has the database open; a second one would destroy data. */
export class AlreadyOpen extends Error {
  override readonly name = "AlreadyOpen";
}

export interface Lock {
  release(): void;
}

/** Whose lock it is: the process, and when it began, since numbers of processes are used again. */
interface Owner {
  pid: number;
  began: string | null;
}

/**
 * Takes a lock file, or takes over one whose process is gone (after a power cut or kill -9).
 *
 * @throws AlreadyOpen naming the process that holds it
 */
export function takeLock(path: string): Lock {
  const own = `${path}.${process.pid}`;
  const text = JSON.stringify({ pid: process.pid, began: beganAt(process.pid) } satisfies Owner);
  writeFileSync(own, text, { mode: 0o600 });
  try {
    // A link appears complete or not at all, so nobody reads half a lock.
    if (!linked(own, path)) {
      removeStale(path);
      if (!linked(own, path)) throw heldBy(path);
    }
  } finally {
    rmSync(own, { force: true });
  }
  return {
    release: () => {
      if (read(path) === text) rmSync(path, { force: true });
    },
  };
}

function linked(from: string, to: string): boolean {
  try {
    linkSync(from, to);
    return true;
  } catch (error) {
    if (error instanceof Error && "code" in error && error.code === "EEXIST") return false;
    throw error;
  }
}

function removeStale(path: string): void {
  const seen = read(path);
  if (seen === undefined) return;
  if (isAlive(parse(seen))) throw heldBy(path);
  const aside = `${path}.stale.${process.pid}`;
  renameSync(path, aside);
  // Between reading and renaming, another start may have taken the lock over: then it gets it back.
  if (read(aside) !== seen) linked(aside, path);
  rmSync(aside, { force: true });
}

function heldBy(path: string): AlreadyOpen {
  const owner = parse(read(path) ?? "");
  const who = owner === undefined ? "another process" : `the process ${owner.pid}`;
  return new AlreadyOpen(
    `The database is open in ${who} (lock ${path}). Stop that server first, or give this one a DATA_DIR of its own.`,
  );
}

function read(path: string): string | undefined {
  try {
    return readFileSync(path, "utf8");
  } catch {
    return undefined;
  }
}

function parse(text: string): Owner | undefined {
  try {
    const { pid, began } = JSON.parse(text);
    return Number.isInteger(pid) && pid > 0 ? { pid, began: began ?? null } : undefined;
  } catch {
    return undefined;
  }
}

function isAlive(owner: Owner | undefined): boolean {
  if (owner === undefined) return false;
  try {
    process.kill(owner.pid, 0);
  } catch (error) {
    // EPERM: it runs, as somebody else.
    if (!(error instanceof Error && "code" in error && error.code === "EPERM")) return false;
  }
  const began = beganAt(owner.pid);
  return began === null || owner.began === null || began === owner.began;
}

/** Where the system tells: boot and clock ticks at which a process began. A restarted container uses numbers again. */
function beganAt(pid: number): string | null {
  try {
    const boot = readFileSync("/proc/sys/kernel/random/boot_id", "utf8").trim();
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    // Fields are counted from the last parenthesis: the program's name may hold spaces.
    const ticks = stat.slice(stat.lastIndexOf(")") + 2).split(" ")[19];
    return `${boot} ${ticks}`;
  } catch {
    return null;
  }
}
