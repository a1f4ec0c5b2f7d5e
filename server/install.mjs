import { spawnSync } from "node:child_process";
import { existsSync, linkSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { ROOT } from "./bundle.mjs";

const LOCK = join(ROOT, ".cache", "install.lock");

/**
 * Installs the packages on a fresh clone, so that the first command just works. `npm ci` empties node_modules first, so
 * only one launch does it while the others wait.
 *
 * @returns {Promise<void>}
 */
export async function installMissing() {
  while (!isInstalled()) {
    if (!takeLock()) {
      await wait(200);
      continue;
    }
    try {
      // It may have been done while this launch waited for the lock.
      if (!isInstalled()) return install();
    } finally {
      rmSync(LOCK, { force: true });
    }
  }
}

/** npm writes its own record last: without it an installation was cut short. */
function isInstalled() {
  const { dependencies } = JSON.parse(readFileSync(join(ROOT, "package.json"), "utf8"));
  const packages = join(ROOT, "node_modules");
  return (
    existsSync(join(packages, ".package-lock.json")) &&
    Object.keys(dependencies).every((name) => existsSync(join(packages, name, "package.json")))
  );
}

function install() {
  process.stderr.write("quenchline: installing its packages with npm ci, this once (a minute or so) …\n");
  const npm = process.env.npm_execpath;
  const [program, first] = npm?.endsWith(".js") ? [process.execPath, [npm]] : ["npm", []];
  const { status, error } = spawnSync(program, [...first, "ci", "--loglevel=error"], {
    cwd: ROOT,
    stdio: ["ignore", 2, "inherit"],
    shell: process.platform === "win32" && program === "npm",
  });
  if (status === 0) return;
  throw new Error(`npm ci failed${error ? ` (${error.message})` : ""}: run "npm ci" in ${ROOT} and see what it says`);
}

/** The lock appears together with its owner's number; that of a launch that was killed while it installed is removed. */
function takeLock() {
  mkdirSync(dirname(LOCK), { recursive: true });
  const own = `${LOCK}.${process.pid}`;
  writeFileSync(own, String(process.pid));
  try {
    linkSync(own, LOCK);
    return true;
  } catch (error) {
    if (error.code !== "EEXIST") throw error;
  } finally {
    rmSync(own);
  }
  try {
    process.kill(Number(readFileSync(LOCK, "utf8")), 0);
  } catch (error) {
    if (error.code === "ESRCH") rmSync(LOCK, { force: true });
  }
  return false;
}
