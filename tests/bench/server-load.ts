// How the server bears large files: `npx tsx tests/bench/server-load.ts [--quick]`. Starts the server as it is shipped.
import { createWriteStream, openAsBlob, readFileSync, writeFileSync } from "node:fs";
import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { Readable } from "node:stream";
import { pipeline } from "node:stream/promises";
import { setTimeout as wait } from "node:timers/promises";
import type { Job } from "#shared/contract/jobs.ts";
import { generateToolpath } from "#tests/bench/generate-toolpath.ts";
import { median } from "#tests/bench/statistics.ts";
import { bundleServer, RealServer } from "#tests/helpers/real-server.ts";

const quick = process.argv.includes("--quick");
const SMALL_BYTES = quick ? 2e7 : 1e8;
const LARGE_BYTES = quick ? 2e8 : 1e9;
const ASK_EVERY_MS = 20;

const folder = await mkdtemp(join(tmpdir(), "quenchline-load-"));
const bundle = await bundleServer();
const server = await RealServer.make(bundle);

async function generated(bytes: number): Promise<string> {
  const path = join(folder, `${bytes}.gcode`);
  await pipeline(Readable.from(generateToolpath(bytes)), createWriteStream(path));
  return path;
}

const hasEnded = ({ state }: Job): boolean => state !== "queued" && state !== "running";
const seconds = (ms: number): string => `${(ms / 1000).toFixed(2)} s`;
const say = (text: string): void => void process.stdout.write(`${text}\n`);

/** Largest resident size so far, MB. */
function peakMB(): number {
  const status = readFileSync(`/proc/${server.pid}/status`, "utf8");
  return Number(/^VmHWM:\s+(\d+) kB$/m.exec(status)?.[1]) / 1024;
}

/** From here on the largest size counts anew. */
function forgetPeak(): void {
  writeFileSync(`/proc/${server.pid}/clear_refs`, "5");
}

async function untilEnded(jobId: string): Promise<Job> {
  for (;;) {
    const job: Job = await server.json(`/api/jobs/${jobId}`);
    if (hasEnded(job)) return job;
    await wait(50);
  }
}

async function uploadAndRead(path: string) {
  const start = performance.now();
  const { toolpath, reading } = await server.upload(await openAsBlob(path), "bench.gcode");
  const uploaded = performance.now();
  const { state } = await untilEnded(reading.jobId);
  if (state !== "done") throw new Error(`the reading is ${state}`);
  return { toolpath, reading, uploadMs: uploaded - start, readMs: performance.now() - uploaded };
}

/** Asks for a list again and again while work goes on, as another person's browser would. */
async function latencies(work: Promise<unknown>): Promise<number[]> {
  const taken: number[] = [];
  let working = true;
  const ended = work.finally(() => {
    working = false;
  });
  while (working) {
    const start = performance.now();
    await server.json("/api/toolpaths");
    taken.push(performance.now() - start);
    await wait(ASK_EVERY_MS);
  }
  await ended;
  return taken;
}

function sayLatencies(what: string, taken: number[]): void {
  const sorted = taken.sort((a, b) => a - b);
  const at = (share: number): string =>
    `${sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))].toFixed(1)} ms`;
  say(`${what}: median ${at(0.5)}, 95th percentile ${at(0.95)}, longest ${at(1)} (${sorted.length} requests)`);
}

async function smallFile(): Promise<void> {
  const path = await generated(SMALL_BYTES);
  const ratios: number[] = [];
  for (let turn = 0; turn < 5; turn++) {
    const { toolpath, uploadMs, readMs } = await uploadAndRead(path);
    ratios.push(readMs / uploadMs);
    say(`${SMALL_BYTES / 1e6} MB: upload ${seconds(uploadMs)}, reading ${seconds(readMs)} after it`);
    await server.fetch(`/api/toolpaths/${toolpath.id}`, { method: "DELETE" });
  }
  say(`reading ÷ upload: median ${median(ratios).toFixed(2)} (limit 1.5); peak memory ${peakMB().toFixed(0)} MB`);
}

async function largeFile(): Promise<void> {
  const path = await generated(LARGE_BYTES);
  const upload = openAsBlob(path).then((blob) => server.upload(blob, "large.gcode"));
  sayLatencies(`others while ${LARGE_BYTES / 1e6} MB are uploaded`, await latencies(upload));
  const { reading } = await upload;
  const start = performance.now();
  sayLatencies("others while they are read", await latencies(untilEnded(reading.jobId)));
  say(`reading ${seconds(performance.now() - start)}; peak memory ${peakMB().toFixed(0)} MB`);
  const post = (value: unknown) => ({
    method: "POST",
    headers: { "content-type": "application/json" },
    body: JSON.stringify(value),
  });
  const document = JSON.parse(readFileSync(new URL("./profile.json", import.meta.url), "utf8"));
  const { id } = await server.json("/api/profiles", post({ document }));
  const request = { readingId: reading.id, profileId: id, profileVersion: 1 };
  const began = performance.now();
  const tuning = await server.json("/api/tunings", post(request));
  sayLatencies("others while it is tuned and proven", await latencies(untilEnded(tuning.jobId)));
  const { state, proof } = await server.json(`/api/tunings/${tuning.id}`);
  say(
    `tuning ${state}, proof passed: ${proof?.passed}, ${seconds(performance.now() - began)}; peak memory ${peakMB().toFixed(0)} MB`,
  );
}

try {
  const variables = { WORKERS: "1", LOG_LEVEL: "error" };
  await server.start(variables);
  say(`after the first start, which makes the database: peak memory ${peakMB().toFixed(0)} MB`);
  await server.kill("SIGTERM");
  await server.start(variables);
  await wait(1_000);
  forgetPeak();
  say(`after the next start: memory ${peakMB().toFixed(0)} MB`);
  sayLatencies("others while nothing is done", await latencies(wait(3_000)));
  await smallFile();
  await largeFile();
} finally {
  await server.remove();
  await rm(bundle, { recursive: true, force: true });
  await rm(folder, { recursive: true, force: true });
}
