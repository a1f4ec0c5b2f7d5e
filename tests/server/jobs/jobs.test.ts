import type { AddressInfo } from "node:net";
import { describe, expect, test, vi } from "vitest";
import { DatabaseQueue, MOST_ATTEMPTS } from "#server/jobs/job-queue.ts";
import type { NewJob } from "#server/jobs/queries.ts";
import { WorkerThread } from "#server/jobs/worker-thread.ts";
import { openWorkshop } from "#server/jobs/workshop.ts";
import type { Job } from "#shared/contract/jobs.ts";
import { parseMachine } from "#shared/formats/machine.ts";
import { testServer } from "#tests/helpers/server.ts";
import { addMachine, endedReading, eventually, sampleBytes, sampleJson, upload } from "#tests/helpers/workshop.ts";

// The workshop of this server is not started: jobs wait until a test takes them.
const server = testServer({ WORKERS: "1" });

const newJob = (key: string): NewJob => ({
  id: crypto.randomUUID(),
  teamId: server.person("lead").teamId,
  kind: "read",
  key,
  subject: { toolpathId: crypto.randomUUID(), readingId: crypto.randomUUID() },
  ofBytes: 100,
});
const queue = () => new DatabaseQueue(server.parts.db);

describe("the queue", () => {
  test("gives each job to one claimer, the oldest first", async () => {
    const { db } = server.parts;
    const ids: string[] = [];
    for (const key of ["a", "b", "c"]) ids.push((await queue().enqueue(db, newJob(key))).job.id);
    const claimed = await Promise.all([queue().claim(), queue().claim(), queue().claim(), queue().claim()]);
    expect(claimed.map((job) => job?.id)).toEqual([...ids, undefined]);
    expect(claimed[0]).toMatchObject({ state: "running", attempts: 1 });
  });

  test("takes equal work once, until it has ended otherwise than well", async () => {
    const { db } = server.parts;
    const { job } = await queue().enqueue(db, newJob("same"));
    expect(await queue().enqueue(db, newJob("same"))).toEqual({ job, isNew: false });
    await queue().claim();
    await queue().finish(db, job.id);
    expect((await queue().enqueue(db, newJob("same"))).isNew).toBe(false);
    const other = await queue().enqueue(db, newJob("other"));
    await queue().cancelWaiting(other.job.id);
    expect((await queue().enqueue(db, newJob("other"))).isNew).toBe(true);
  });

  test("begins a job again that a server's end broke off, and gives it up after three times", async () => {
    const { job } = await queue().enqueue(server.parts.db, newJob("crash"));
    for (let attempt = 1; attempt < MOST_ATTEMPTS; attempt++) {
      expect((await queue().claim())?.attempts).toBe(attempt);
      expect((await queue().recover()).map(({ state }) => state)).toEqual(["queued"]);
    }
    await queue().claim();
    const [given] = await queue().recover();
    expect(given).toMatchObject({
      id: job.id,
      state: "failed",
      refusal: { code: "gave-up", remedy: expect.any(String) },
    });
    expect(await queue().claim()).toBeUndefined();
  });

  test("a job ends once: what comes later changes nothing", async () => {
    const { db } = server.parts;
    const { job } = await queue().enqueue(db, newJob("ends"));
    await queue().claim();
    await queue().cancelRunning(job.id);
    expect(await queue().finish(db, job.id)).toBeUndefined();
    expect(await queue().cancelWaiting(job.id)).toBeUndefined();
    expect(await queue().hasEnded(job.id)).toBe(true);
  });
});

test("a waiting job is cancelled; operators may, viewers may not; a job that has ended stays as it is", async () => {
  const { body } = await upload(server, await addMachine(server), sampleBytes("seal-ring")).expect(201);
  const job = `/api/jobs/${body.reading.jobId}`;
  expect((await server.as("viewer").get(job).expect(200)).body).toMatchObject({
    kind: "read",
    state: "queued",
    progress: { bytes: 0, ofBytes: sampleBytes("seal-ring").length },
    readingId: body.reading.id,
  });
  await server.as("viewer").delete(job).expect(403);
  await server.as("lead", "birch").delete(job).expect(404);
  for (let k = 0; k < 2; k++)
    expect((await server.as("operator").delete(job).expect(200)).body.state).toBe("cancelled");
  expect((await endedReading(server, body.reading.id)).state).toBe("cancelled");
  const { body: early } = await server.as("viewer").get(`/api/readings/${body.reading.id}/document`).expect(409);
  expect(early.code).toBe("not-ready");
});

test("a job that says it runs, but that nobody works on, can be cancelled", async () => {
  const { body } = await upload(server, await addMachine(server), sampleBytes("seal-ring")).expect(201);
  await queue().claim();
  const cancelled = await server.as("operator").delete(`/api/jobs/${body.reading.jobId}`).expect(200);
  expect(cancelled.body.state).toBe("cancelled");
});

test("a worker that falls silent is ended, and its job fails visibly after three tries", async () => {
  const { body } = await upload(server, await addMachine(server), sampleBytes("seal-ring")).expect(201);
  // No worker says anything within a millisecond of its start.
  const workshop = await openWorkshop(server.parts, { silenceMs: 1, cancelMs: 1_000 });
  await workshop.start();
  try {
    const reading = await endedReading(server, body.reading.id);
    expect(reading).toMatchObject({ state: "failed", refusal: { code: "gave-up" } });
    expect(server.logged.filter((line) => line.includes("no sign of life"))).toHaveLength(MOST_ATTEMPTS);
  } finally {
    await workshop.close();
  }
});

test("a worker that dies takes its job with it, not the server; the next job gets a new one", async () => {
  const { storage } = server.parts.workshop.shelf;
  const staged = await storage.stage([sampleBytes("seal-ring")] as unknown as AsyncIterable<Uint8Array>, "test");
  await storage.keep(staged);
  const storageRoot = `${server.parts.env.DATA_DIR}/files`;
  const thread = new WorkerThread({ storageRoot }, { silenceMs: 60_000, cancelMs: 1_000 });
  const machine = parseMachine(sampleJson("machines/tern.json"));
  const task = { kind: "read", file: staged, machine } as const;
  const going = new AbortController().signal;
  const run = thread.run("job", task, going, () => {});
  await thread.close();
  expect(await run).toMatchObject({ end: "failed", reason: expect.stringContaining("the worker ended") });
  expect(await thread.run("job", task, going, () => {})).toMatchObject({ end: "done" });
  const lost = await thread.run("job", { ...task, file: { sha256: "0".repeat(64), bytes: 1 } }, going, () => {});
  expect(lost).toMatchObject({ end: "failed", reason: expect.stringContaining("no bytes are stored") });
  await thread.close();
});

test("a team hears of its own jobs only, from the waiting ones to the last event, and again after a break", async () => {
  const listening = server.app.listen(0);
  const leave = new AbortController();
  try {
    const { port } = listening.address() as AddressInfo;
    const listen = async (team: "alder" | "birch", headers: Record<string, string> = {}) => {
      const { cookie } = server.person("viewer", team);
      const init = { headers: { cookie, ...headers }, signal: leave.signal };
      return collect(await fetch(`http://localhost:${port}/api/events`, init));
    };
    const { body } = await upload(server, await addMachine(server), sampleBytes("seal-ring")).expect(201);
    const [own, strange] = [await listen("alder"), await listen("birch")];
    await eventually(
      async () => own.jobs,
      (jobs) => jobs.some(({ state }) => state === "queued"),
    );
    const workshop = server.parts.workshop;
    await workshop.start();
    await eventually(
      async () => own.jobs,
      (jobs) => jobs.some(({ state }) => state === "done"),
    );
    expect(new Set(own.jobs.map(({ id }) => id))).toEqual(new Set([body.reading.jobId]));
    expect([...new Set(own.jobs.map(({ state }) => state))]).toEqual(["queued", "running", "done"]);
    const late = await listen("alder", { "Last-Event-ID": String(Date.now() - 1_000) });
    await eventually(
      async () => late.jobs,
      (jobs) => jobs.some(({ state }) => state === "done"),
    );
    expect(strange.jobs).toEqual([]);
    await server.with().get("/api/events").expect(401);
  } finally {
    leave.abort();
    listening.close();
  }
});

test("a stream of events ends soon after its session does, and lasts as long as that holds", async () => {
  vi.useFakeTimers({ toFake: ["setInterval", "clearInterval"] });
  const listening = server.app.listen(0);
  const leave = new AbortController();
  try {
    const { port } = listening.address() as AddressInfo;
    const listen = (role: "viewer" | "operator") => {
      const { cookie } = server.person(role);
      return fetch(`http://localhost:${port}/api/events`, { headers: { cookie }, signal: leave.signal });
    };
    const [left, stays] = [await listen("viewer"), collect(await listen("operator"))];
    const ended = left.text();
    await server.as("viewer").delete("/api/session").expect(204);
    vi.advanceTimersByTime(10_000);
    expect(await ended).toMatch(/^retry: \d+\n\n$/);
    await queue()
      .enqueue(server.parts.db, newJob("heard"))
      .then(({ job }) => server.parts.workshop.announce(job));
    await eventually(
      async () => stays.jobs,
      (jobs) => jobs.length > 0,
    );
  } finally {
    leave.abort();
    listening.close();
    vi.useRealTimers();
  }
});

/** Gathers what an event stream says as long as it lasts. */
function collect(reply: Response): { jobs: Job[] } {
  expect(reply.headers.get("content-type")).toContain("text/event-stream");
  const heard: { jobs: Job[] } = { jobs: [] };
  const read = async () => {
    let text = "";
    for await (const piece of reply.body as unknown as AsyncIterable<Uint8Array>) {
      text += Buffer.from(piece).toString("utf8");
      const events = text.split("\n\n");
      text = events.pop()!;
      for (const event of events) {
        const data = /^event: job\ndata: (.*)$/m.exec(event)?.[1];
        if (data !== undefined) heard.jobs.push(JSON.parse(data));
      }
    }
  };
  read().catch(() => {});
  return heard;
}
