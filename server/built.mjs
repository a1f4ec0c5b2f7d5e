import { spawnSync } from "node:child_process";
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { bundle, fingerprint, PROGRAM_SOURCES, ROOT } from "./bundle.mjs";

const DIST = join(ROOT, "dist");
/** The worker and the database's maker stand beside the server, which starts them under these names. */
export const PROGRAMS = {
  quenchline: "server/cli/quenchline.ts",
  index: "server/index.ts",
  worker: "server/jobs/worker.ts",
  "database-maker": "server/db/database-maker.ts",
};
const CLIENT_SOURCES = [
  "shared",
  "src",
  "index.html",
  "vite.config.ts",
  "tailwind.config.ts",
  "package.json",
  "package-lock.json",
];

/** Bundles command line, server and worker into dist/, beside the client. */
export async function buildPrograms() {
  const state = fingerprint(PROGRAM_SOURCES);
  mkdirSync(DIST, { recursive: true });
  for (const name of readdirSync(DIST)) if (/\.mjs(\.map)?$/.test(name)) rmSync(join(DIST, name));
  await bundle(PROGRAMS, DIST);
  writeFileSync(stampOf("programs"), state);
}

/** Builds the pages and what they load into dist/client/. */
export async function buildClient() {
  const state = fingerprint(CLIENT_SOURCES);
  const vite = join(ROOT, "node_modules", "vite", "bin", "vite.js");
  const { status } = spawnSync(process.execPath, [vite, "build", "--logLevel", "warn"], {
    cwd: ROOT,
    // What the build says is for whoever waits for it, not part of the program's output.
    stdio: ["ignore", 2, 2],
  });
  if (status !== 0) throw new Error('the client can\'t be built: run "npm run build" and see what it says');
  writeFileSync(stampOf("client"), state);
}

/**
 * Builds what is missing or older than its sources.
 *
 * @returns {Promise<string>} path of the server, which runs when it is imported
 */
export async function freshServer() {
  const server = join(DIST, "index.mjs");
  await unlessFresh("programs", PROGRAM_SOURCES, server, buildPrograms);
  await unlessFresh("client", CLIENT_SOURCES, join(DIST, "client", "index.html"), buildClient);
  return server;
}

/** From which state of the sources something was built. */
const stampOf = (what) => join(DIST, `${what}.built`);

async function unlessFresh(what, sources, result, build) {
  const stamp = stampOf(what);
  if (existsSync(result) && existsSync(stamp) && readFileSync(stamp, "utf8") === fingerprint(sources)) return;
  process.stderr.write(`quenchline: building its ${what} …\n`);
  await build();
}
