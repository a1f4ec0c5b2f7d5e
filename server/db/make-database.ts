import { fork } from "node:child_process";
import { once } from "node:events";
import { readdir, rename, rm } from "node:fs/promises";
import { basename, dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { ROOT } from "#server/root.ts";

/**
 * Makes an empty database with all its tables, in a process of its own. The folder appears under its name complete: a
 * start that is killed meanwhile leaves only what the next one removes. The caller holds the lock.
 */
export async function makeDatabase(folder: string): Promise<void> {
  const parent = dirname(folder);
  const prefix = `${basename(folder)}.unfinished-`;
  for (const name of await readdir(parent))
    if (name.startsWith(prefix)) await rm(join(parent, name), { recursive: true, force: true });
  // A maker whose server was killed may still be at work, hence a name of its own.
  const unfinished = join(parent, `${prefix}${process.pid}`);
  await runMaker(unfinished);
  await rename(unfinished, folder);
}

async function runMaker(folder: string): Promise<void> {
  const fromSource = import.meta.url.endsWith(".ts");
  const program = new URL(fromSource ? "./database-maker.ts" : "./database-maker.mjs", import.meta.url);
  const child = fork(fileURLToPath(program), [folder], {
    cwd: ROOT,
    execArgv: fromSource ? ["--import", "tsx"] : [],
    stdio: ["ignore", "ignore", "pipe", "ipc"],
  });
  let said = "";
  child.stderr?.setEncoding("utf8").on("data", (text: string) => {
    said += text;
  });
  const [status, signal] = await once(child, "close");
  if (status !== 0) throw new Error(`the database could not be made (${signal ?? status}): ${said}`);
}
