import { readdir, readFile, rm } from "node:fs/promises";
import { join } from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import { bundleServer, RealServer } from "#tests/helpers/real-server.ts";
import { eventually } from "#tests/helpers/workshop.ts";

const MOST_MB = 600;
const LISTS = { members: 4, machines: 2, polymers: 8, profiles: 7, toolpaths: 4, tunings: 1 };
let bundle: string;
let server: RealServer;
beforeAll(async () => {
  bundle = await bundleServer();
  server = await RealServer.make(bundle);
}, 60_000);
afterAll(async () => {
  await server.remove();
  await rm(bundle, { recursive: true, force: true });
});

const namesIn = (...path: string[]): Promise<string[]> => readdir(join(server.dataDir, ...path)).catch(() => []);

/** Largest resident size of the serving process so far, MB; 0 where the system doesn't tell. */
async function peakMB(): Promise<number> {
  const status = await readFile(`/proc/${server.pid}/status`, "utf8").catch(() => "");
  return Number(/^VmHWM:\s+(\d+) kB$/m.exec(status)?.[1] ?? 0) / 1024;
}

/** Niceness of every thread of the serving process, ascending; the main thread's is 0 unless the tests run nicely. */
async function nicenesses(): Promise<number[]> {
  const threads = await readdir(`/proc/${server.pid}/task`).catch(() => []);
  const stats = await Promise.all(threads.map((id) => readFile(`/proc/${server.pid}/task/${id}/stat`, "utf8")));
  // Fields are counted from the last parenthesis: a thread's name may hold spaces.
  return stats.map((stat) => Number(stat.slice(stat.lastIndexOf(")") + 2).split(" ")[16])).sort((a, b) => a - b);
}

/** Begins a start and kills it as soon as something is there. @returns its largest size until then, MB */
async function killedOnce(isThere: () => Promise<boolean>): Promise<number> {
  const starting = server.start({ WORKERS: "1" }).then(
    () => "ready",
    () => "killed",
  );
  await eventually(isThere, (is) => is, 120_000);
  const peak = await peakMB();
  await server.kill();
  expect(await starting).toBe("killed");
  return peak;
}

test("first starts that are killed, while the database is made and while the demo is, leave nothing undone and take little memory; the worker stands behind requests", async () => {
  await killedOnce(async () => (await namesIn()).some((name) => name.startsWith("database.unfinished-")));
  expect(await namesIn("database")).toEqual([]);
  const isSeeding = async () => (await namesIn("files")).some((name) => /^[0-9a-f]{2}$/.test(name));
  expect(await killedOnce(isSeeding)).toBeLessThan(MOST_MB);
  await server.start({ WORKERS: "1" });
  expect(await peakMB()).toBeLessThan(MOST_MB);
  for (const [name, count] of Object.entries(LISTS)) expect(await server.json(`/api/${name}`)).toHaveLength(count);
  const [requests, ...others] = await nicenesses();
  if (requests === 0) expect(others.filter((niceness) => niceness > 0)).toHaveLength(1);
  await eventually(namesIn, (names) => names.every((name) => !name.includes("unfinished")));
}, 300_000);
