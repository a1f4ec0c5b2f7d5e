import { createHash, randomBytes } from "node:crypto";
import { existsSync, readdirSync, renameSync, rmSync, statSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

/** The project's folder, with a separator at its end. */
export const ROOT = fileURLToPath(new URL("..", import.meta.url));
const CACHE = join(ROOT, "node_modules", ".cache", "quenchline");
/** What a program outside the browser is made from. */
export const PROGRAM_SOURCES = ["shared", "server", "package.json", "package-lock.json"];
const DAY_MS = 86_400_000;

/**
 * Bundles the programs that run outside the browser, side by side. Packages stay outside the bundle; what a program
 * imports only when it needs it becomes a file of its own, so that `--help` doesn't load the engine.
 *
 * @param {Record<string, string>} entries name of the bundled file -> source, relative to the project
 * @param {string} outDir
 */
export async function bundle(entries, outDir) {
  const { build } = await import("esbuild");
  await build({
    absWorkingDir: ROOT,
    entryPoints: entries,
    outdir: outDir,
    outExtension: { ".js": ".mjs" },
    bundle: true,
    splitting: true,
    platform: "node",
    format: "esm",
    target: "node20",
    packages: "external",
    sourcemap: true,
    // Named constants become literals: the reader runs a third slower without.
    minifySyntax: true,
    logLevel: "silent",
  });
}

/**
 * The bundled command line, made anew only when a source has changed. A bundle is named after the state of the sources
 * it was made from and appears under that name complete: launches at the same time can't disturb one another.
 *
 * @returns {Promise<string>} path of the program, which runs when it is imported
 */
export async function freshCommandLine() {
  const folder = join(CACHE, fingerprint(PROGRAM_SOURCES));
  const program = join(folder, "quenchline.mjs");
  if (existsSync(program)) return program;
  const unfinished = `${folder}.${process.pid}-${randomBytes(4).toString("hex")}`;
  try {
    await bundle({ quenchline: "server/cli/quenchline.ts" }, unfinished);
    renameSync(unfinished, folder);
  } catch (error) {
    rmSync(unfinished, { recursive: true, force: true });
    // Another launch was faster: its bundle is as good.
    if (!existsSync(program)) throw error;
  }
  removeOld(folder);
  return program;
}

/**
 * Names, sizes and times of all sources; reading their contents would cost more than the bundle saves.
 *
 * @param {readonly string[]} sources files and folders, relative to the project
 */
export function fingerprint(sources) {
  const hash = createHash("sha256");
  const add = (path) => {
    const { mtimeMs, size } = statSync(join(ROOT, path));
    hash.update(`${path}\0${mtimeMs}\0${size}\n`);
  };
  const walk = (path) => {
    if (!statSync(join(ROOT, path)).isDirectory()) return add(path);
    for (const name of readdirSync(join(ROOT, path))) if (!name.endsWith(".tsbuildinfo")) walk(`${path}/${name}`);
  };
  for (const path of sources) walk(path);
  return hash.digest("hex").slice(0, 16);
}

/** A running program loads parts of its bundle late, so a bundle is only removed a day after it was made. */
function removeOld(current) {
  const before = Date.now() - DAY_MS;
  for (const name of readdirSync(CACHE)) {
    const folder = join(CACHE, name);
    try {
      if (folder !== current && statSync(folder).mtimeMs < before) rmSync(folder, { recursive: true, force: true });
    } catch {
      // Another launch is removing the same one.
    }
  }
}
