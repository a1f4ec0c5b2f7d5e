import { readdir, rm } from "node:fs/promises";
import { join } from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import type { Job } from "#shared/contract/jobs.ts";
import { generateToolpath } from "#tests/bench/generate-toolpath.ts";
import { bundleServer, RealServer } from "#tests/helpers/real-server.ts";
import { eventually } from "#tests/helpers/workshop.ts";

/** Large enough to be caught while it is read. */
const LARGE = new Blob([...generateToolpath(120e6)]);
let bundle: string;
let server: RealServer;

// One server for all: each start costs seconds, and what one test leaves does not disturb the next.
beforeAll(async () => {
  bundle = await bundleServer();
  server = await RealServer.make(bundle);
  await server.start({ WORKERS: "1" });
}, 300_000);
afterAll(async () => {
  await server.remove();
  await rm(bundle, { recursive: true, force: true });
});

const jobOf = (id: string): Promise<Job> => server.json(`/api/jobs/${id}`);
const isRunning = ({ state, progress }: Job): boolean => state !== "queued" && progress.bytes > 0;
const hasEnded = ({ state }: { state: string }): boolean => state !== "queued" && state !== "running";
/** What is staged, other than by a job that is running. */
const temporaries = (): Promise<string[]> => readdir(join(server.dataDir, "files", "incoming"));

test("the demo team has four toolpaths that are read, and one tuning that is proven", async () => {
  const toolpaths = await eventually(
    () => server.json("/api/toolpaths"),
    (list: { readings: { state: string }[] }[]) => list.every(({ readings }) => hasEnded(readings[0])),
  );
  expect(toolpaths.map(({ readings }: { readings: { state: string }[] }) => readings[0].state)).toEqual(
    Array(4).fill("done"),
  );
  const [tuning] = await eventually(
    () => server.json("/api/tunings"),
    (list: { state: string }[]) => list.length > 0 && list.every(hasEnded),
  );
  expect(tuning).toMatchObject({ toolpathName: "seal-ring.gcode", status: "approved", proof: { passed: true } });
}, 300_000);

test("a job that runs when the server is killed is begun again by the next one, and ends", async () => {
  const { reading } = await server.upload(LARGE, "large.gcode");
  const job = await eventually(() => jobOf(reading.jobId), isRunning);
  expect(job.state).toBe("running");
  await server.kill();
  await server.start({ WORKERS: "1" });
  expect((await eventually(() => jobOf(reading.jobId), hasEnded)).state).toBe("done");
  const { summary } = await server.json(`/api/readings/${reading.id}`);
  expect(summary.layers).toBeGreaterThan(100);
  expect(await temporaries()).toEqual([]);
}, 300_000);

test("an upload that is cut off by a kill leaves nothing; the server stops when asked, and goes on where it was", async () => {
  const half = new ReadableStream({
    pull: async (controller) => {
      controller.enqueue(new Uint8Array(65_536).fill(10));
      await new Promise((resolve) => setTimeout(resolve, 5));
    },
  });
  const boundary = '--b\r\nContent-Disposition: form-data; name="file"; filename="half.gcode"\r\n\r\n';
  const body = new ReadableStream({
    start: async (controller) => {
      controller.enqueue(new TextEncoder().encode(boundary));
      try {
        for await (const piece of half) controller.enqueue(piece);
      } catch {
        // The server is gone.
      }
    },
  });
  const headers = { "content-type": "multipart/form-data; boundary=b" };
  const init = { method: "POST", headers, body, duplex: "half" } as RequestInit;
  const sent = server.fetch(`/api/toolpaths?machine=${await server.machineId("Tern")}`, init).catch(() => undefined);
  await eventually(temporaries, (names) => names.some((name) => name.startsWith("upload-")));
  const before = await server.json("/api/toolpaths");
  await server.kill();
  await sent;
  await server.start({ WORKERS: "1" });
  expect(await temporaries()).toEqual([]);
  expect(await server.json("/api/toolpaths")).toHaveLength(before.length);

  const { reading } = await server.upload(LARGE, "large.gcode");
  await eventually(() => jobOf(reading.jobId), isRunning);
  await server.kill("SIGTERM");
  await server.start({ WORKERS: "1" });
  expect((await eventually(() => jobOf(reading.jobId), hasEnded)).state).toBe("done");
}, 300_000);

test("a running job is cancelled, and the file can be read again", async () => {
  const { toolpath, reading } = await server.upload(LARGE, "large.gcode");
  await eventually(() => jobOf(reading.jobId), isRunning);
  const cancelled: Job = await server.json(`/api/jobs/${reading.jobId}`, { method: "DELETE" });
  expect(cancelled.state).toBe("cancelled");
  expect(await temporaries()).toEqual([]);
  const init = {
    method: "POST",
    headers: { "content-type": "application/json" },
    body: JSON.stringify({ machineId: reading.machineId, machineVersion: 1 }),
  };
  const again = await server.json(`/api/toolpaths/${toolpath.id}/readings`, init);
  expect(again.id).not.toBe(reading.id);
  expect((await eventually(() => jobOf(again.jobId), hasEnded)).state).toBe("done");
  expect((await server.json(`/api/readings/${reading.id}`)).state).toBe("cancelled");
}, 300_000);
