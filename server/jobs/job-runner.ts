import { setTimeout as wait } from "node:timers/promises";
import type { Logger } from "pino";
import type { Db } from "#server/db/client.ts";
import type { JobEvents } from "#server/jobs/job-events.ts";
import type { JobKind, JobKinds } from "#server/jobs/job-kind.ts";
import type { JobQueue } from "#server/jobs/job-queue.ts";
import { jobView } from "#server/jobs/job-view.ts";
import type { JobRow } from "#server/jobs/queries.ts";
import type { Task, TaskProgress, TaskResult } from "#server/jobs/tasks.ts";
import type { Outcome, WorkerThread } from "#server/jobs/worker-thread.ts";
import type { Shelf } from "#server/storage/shelf.ts";
import type { RefusalReport } from "#shared/contract/common.ts";

/** Rows are brought up to date this often while a job runs; events come more often. */
const WRITE_EVERY_MS = 1_000;
const RETRY_AFTER_MS = 1_000;
const CLAIM_MS = 20;

interface Running {
  abort: AbortController;
  live?: TaskProgress;
  ended: Promise<void>;
}

export interface RunnerParts {
  db: Db;
  log: Logger;
  queue: JobQueue;
  shelf: Shelf;
  events: JobEvents;
  threads: readonly WorkerThread[];
  kinds: JobKinds;
}

/** Takes jobs from the queue as long as there are any, one for each thread, and sees every one of them to its end. */
export class JobRunner {
  private readonly parts: RunnerParts;
  private readonly running = new Map<string, Running>();
  private loops: Promise<void>[] = [];
  private closing = false;
  private wakeUp: () => void = () => {};
  private woken = new Promise<void>((resolve) => {
    this.wakeUp = resolve;
  });

  constructor(parts: RunnerParts) {
    this.parts = parts;
  }

  /** Takes up what an earlier server left, and begins to work. */
  async start(): Promise<void> {
    const { queue, events, threads } = this.parts;
    for (const job of await queue.recover()) events.tell(job.teamId, jobView(job));
    for (const thread of threads) thread.warm();
    this.loops = threads.map((thread) => this.loop(thread));
  }

  /** There may be something to do. */
  wake(): void {
    this.wakeUp();
    this.woken = new Promise((resolve) => {
      this.wakeUp = resolve;
    });
  }

  /** Progress of a job that runs here, newer than its row's. */
  liveProgress(id: string): TaskProgress | undefined {
    return this.running.get(id)?.live;
  }

  /** Ends a job, waiting or running. One that has ended already stays as it is. */
  async cancel(id: string): Promise<void> {
    const { queue } = this.parts;
    for (;;) {
      const waiting = await queue.cancelWaiting(id);
      if (waiting) return this.tell(waiting);
      const running = this.running.get(id);
      running?.abort.abort();
      await running?.ended;
      if (await queue.hasEnded(id)) return;
      // It was being claimed this very moment, or went back into the queue.
      await wait(CLAIM_MS);
    }
  }

  /** Stops working; what was running is put back and begun again by the next server. */
  async close(): Promise<void> {
    this.closing = true;
    this.wake();
    for (const { abort } of this.running.values()) abort.abort();
    await Promise.all(this.loops);
    await Promise.all(this.parts.threads.map((thread) => thread.close()));
  }

  private async loop(thread: WorkerThread): Promise<void> {
    while (!this.closing) {
      const { woken } = this;
      const job = await this.claim();
      if (job) await this.see(job, thread);
      else await woken;
    }
  }

  private async claim(): Promise<JobRow | undefined> {
    try {
      return await this.parts.queue.claim();
    } catch (error) {
      this.parts.log.error({ err: error }, "no job could be claimed");
      await wait(RETRY_AFTER_MS);
      this.wake();
      return undefined;
    }
  }

  /** From claim to last word. Nothing that goes wrong here ends the loop. */
  private async see(job: JobRow, thread: WorkerThread): Promise<void> {
    let ended = (): void => {};
    const running: Running = {
      abort: new AbortController(),
      ended: new Promise((resolve) => {
        ended = resolve;
      }),
    };
    this.running.set(job.id, running);
    if (this.closing) running.abort.abort();
    try {
      this.tell(job);
      const outcome = await this.work(job, thread, running);
      const row = await this.settle(job, outcome, running.abort.signal);
      this.running.delete(job.id);
      if (row) this.tell(row);
    } catch (error) {
      this.parts.log.error({ err: error, job: job.id }, "a job could not be brought to an end");
      await this.setBack(job);
    } finally {
      this.running.delete(job.id);
      ended();
    }
  }

  private async work(job: JobRow, thread: WorkerThread, running: Running): Promise<Outcome> {
    const { db, shelf, kinds } = this.parts;
    await shelf.storage.discardOf(job.id);
    const task: Task = await kinds[job.kind].task(db, job);
    let nextWrite = Date.now() + WRITE_EVERY_MS;
    return thread.run(job.id, task, running.abort.signal, (progress) => {
      running.live = progress;
      this.tell(job);
      if (Date.now() < nextWrite) return;
      nextWrite = Date.now() + WRITE_EVERY_MS;
      void this.parts.queue.progress(job.id, progress).catch(() => {});
    });
  }

  private async settle(job: JobRow, outcome: Outcome, { aborted }: AbortSignal): Promise<JobRow | undefined> {
    const { queue, shelf, log } = this.parts;
    switch (outcome.end) {
      case "done":
        return this.record(job, outcome.result);
      case "refused":
        return this.refuse(job, outcome.refusal);
      case "cancelled":
        await shelf.storage.discardOf(job.id);
        return this.closing ? queue.giveBack(job.id) : queue.cancelRunning(job.id);
      case "failed":
        log.error({ job: job.id, kind: job.kind, attempt: job.attempts, reason: outcome.reason }, "a job failed");
        await shelf.storage.discardOf(job.id);
        return aborted && !this.closing ? queue.cancelRunning(job.id) : queue.fail(job);
    }
  }

  private record(job: JobRow, result: TaskResult): Promise<JobRow | undefined> {
    const { db, queue, shelf, kinds } = this.parts;
    // The worker answers a task of one kind with a result of that kind.
    const kind = kinds[result.kind] as JobKind<TaskResult["kind"]>;
    return shelf.keep(kind.staged(result), () =>
      db.transaction(async (tx) => {
        await kind.done(tx, job, result);
        return queue.finish(tx, job.id);
      }),
    );
  }

  private async refuse(job: JobRow, refusal: RefusalReport): Promise<JobRow | undefined> {
    const { db, queue, shelf, kinds } = this.parts;
    let unused: string[] = [];
    const row = await db.transaction(async (tx) => {
      unused = (await kinds[job.kind].refused?.(tx, job)) ?? [];
      return queue.refuse(tx, job.id, refusal);
    });
    await shelf.release(unused);
    return row;
  }

  private async setBack(job: JobRow): Promise<void> {
    try {
      await this.parts.shelf.storage.discardOf(job.id);
      const row = await this.parts.queue.fail(job);
      if (row) this.tell(row);
    } catch (error) {
      // The row still says running: the next start takes it up.
      this.parts.log.error({ err: error, job: job.id }, "a job could not be put back");
    }
  }

  private tell(job: JobRow): void {
    this.parts.events.tell(job.teamId, jobView(job, this.liveProgress(job.id)));
    if (job.state === "queued") this.wake();
  }
}

