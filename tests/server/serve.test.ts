import { mkdtempSync, rmSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";
import { AlreadyOpen } from "#server/db/lock.ts";
import { demoSignIns, seedDemo } from "#server/db/seed.ts";
import { readEnv } from "#server/env.ts";
import { makeLog } from "#server/http/logging.ts";
import type { JobRow } from "#server/jobs/queries.ts";
import type { Parts } from "#server/parts.ts";
import { type RunningServer, serve } from "#server/serve.ts";

const folder = mkdtempSync(join(tmpdir(), "quenchline-serve-"));
afterAll(() => rmSync(folder, { recursive: true }));
const log = makeLog("silent");
const envWith = (variables: Record<string, string> = {}) =>
  readEnv({ DATA_DIR: join(folder, "data"), PORT: "0", WORKERS: "1", ...variables });

/** Signs the demo's lead in with the password that the start prints, and asks for lists. */
async function countsOf(server: RunningServer): Promise<Record<string, number>> {
  const [, password] = /the password of each is (\S+)/.exec(await demoSignIns(server.parts))!;
  const signedIn = await fetch(`${server.url}/api/session`, {
    method: "POST",
    headers: { "Content-Type": "application/json" },
    body: JSON.stringify({ email: "lead@alderbay.example", password }),
  });
  const headers = { Cookie: signedIn.headers.get("set-cookie")!.split(";")[0] };
  const counts: Record<string, number> = {};
  for (const name of ["members", "machines", "polymers", "profiles", "toolpaths", "tunings"]) {
    const reply = await fetch(`${server.url}/api/${name}`, { headers });
    counts[name] = ((await reply.json()) as unknown[]).length;
  }
  return counts;
}
const DEMO = { members: 4, machines: 2, polymers: 8, profiles: 7, toolpaths: 4, tunings: 1 };

test("a first start makes the demo team, going on where it was broken off; the next one finds it, and two at once are refused", async () => {
  const steps: string[] = [];
  const brokenOff = ({ workshop, ...parts }: Parts) => {
    const announce = (job: JobRow): void => {
      workshop.announce(job);
      steps.push(job.kind);
      throw new Error("broken off");
    };
    return { ...parts, workshop: { ...workshop, announce } };
  };
  const seedInPieces = async (parts: Parts): Promise<void> => {
    for (let k = 0; k < 5; k++) await expect(seedDemo(brokenOff(parts))).rejects.toThrow("broken off");
    await seedDemo(parts);
  };
  const first = await serve(envWith(), log, seedInPieces);
  expect(steps).toEqual(["read", "read", "read", "read", "tune"]);
  expect(await countsOf(first)).toEqual(DEMO);
  await expect(serve(envWith(), log)).rejects.toThrow(AlreadyOpen);
  expect(await countsOf(first)).toEqual(DEMO);
  await first.close();
  await expect(fetch(first.url)).rejects.toThrow();

  const second = await serve(envWith(), log, seedDemo);
  expect(await countsOf(second)).toEqual(DEMO);
  await second.close();
}, 240_000);

test("a start that fails gives the data folder free again", async () => {
  const other = createServer().listen(0, "127.0.0.1");
  await new Promise((resolve) => other.once("listening", resolve));
  const address = other.address();
  const taken = typeof address === "object" && address ? String(address.port) : "";
  const env = (PORT: string) => envWith({ DATA_DIR: join(folder, "other"), PORT, SEED_DEMO: "no" });
  await expect(serve(env(taken), log, seedDemo)).rejects.toMatchObject({ code: "EADDRINUSE" });
  other.close();
  const server = await serve(env("0"), log, seedDemo);
  expect(await demoSignIns(server.parts)).toBe("");
  await server.close();
}, 240_000);
