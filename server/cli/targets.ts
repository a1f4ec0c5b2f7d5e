import { type BigIntStats, realpathSync, statSync } from "node:fs";
import { basename, dirname, join } from "node:path";
import { callerPath } from "#server/cli/caller-path.ts";
import { UsageError } from "#server/cli/exit.ts";

/** A file to be written. */
export interface Target {
  /** absolute, links followed: a link stays and what it points to is replaced */
  path: string;
  /** permission bits of the file that stands there, if one does */
  mode?: number;
}

/** A file named on the command line. */
export interface NamedFile {
  /** the option or word that names it, e.g. `--out` */
  role: string;
  name: string;
}

/**
 * Checks where files are to be written before any work is done.
 *
 * @param outputs files to write
 * @param inputs files that must not be written over
 * @returns one target for each output, in their order
 * @throws UsageError when a folder is missing, something other than a file stands there, or two names mean one file
 */
export function checkTargets(outputs: readonly NamedFile[], inputs: readonly NamedFile[]): Target[] {
  const seen = new Map(inputs.filter(({ name }) => name !== "-").map((input) => [identity(input.name), input]));
  return outputs.map((output) => {
    const target = checkTarget(output);
    const key = identity(output.name);
    const other = seen.get(key);
    if (other) throw clash(output, other);
    seen.set(key, output);
    return target;
  });
}

/** The target that is the input itself; whether it can be read is found out when it is opened. */
export function targetInPlace(name: string): Target {
  if (name === "-") throw new UsageError("--in-place needs FILE: standard input has no place", "tune");
  const path = callerPath(name);
  const stat = statOf(path);
  return stat === undefined || stat.isDirectory() ? { path } : checkTarget({ role: "--in-place", name });
}

function checkTarget({ role, name }: NamedFile): Target {
  if (name === "-") throw new UsageError(`${role} needs a file name: standard output is not offered`, "tune");
  const path = callerPath(name);
  const stat = statOf(path);
  if (stat && !stat.isFile()) throw new UsageError(`${role}: ${name} is ${kind(stat)}, not a file`, "tune");
  if (stat) return { path: realpathSync(path), mode: Number(stat.mode) };
  if (!statOf(dirname(path))?.isDirectory())
    throw new UsageError(`${role}: the folder ${dirname(path)} is not there; make it first`, "tune");
  return { path };
}

const kind = (stat: BigIntStats): string => (stat.isDirectory() ? "a folder" : "a device or pipe");

function clash(output: NamedFile, other: NamedFile): UsageError {
  const hint = output.role === "--out" && other.role === "FILE" ? "; use --in-place to replace it" : "";
  return new UsageError(`${output.role} and ${other.role} are the same file, ${output.name}${hint}`, "tune");
}

/** Equal for two names of one file, whether through links, another spelling of the folder, or letter case. */
function identity(name: string): string {
  const path = callerPath(name);
  const stat = statOf(path);
  if (stat) return `${stat.dev}:${stat.ino}`;
  try {
    return join(realpathSync(dirname(path)), basename(path));
  } catch {
    return path;
  }
}

function statOf(path: string): BigIntStats | undefined {
  try {
    return statSync(path, { bigint: true });
  } catch {
    return undefined;
  }
}
