import { setTimeout as wait } from "node:timers/promises";
import type { JobEvents } from "#server/jobs/job-events.ts";
import { jobView } from "#server/jobs/job-view.ts";
import type { JobRow } from "#server/jobs/queries.ts";
import { type SettleParts, type Stopped, settleJob } from "#server/jobs/settle-job.ts";
import type { Task, TaskProgress } from "#server/jobs/tasks.ts";
import type { Outcome, WorkerThread } from "#server/jobs/worker-thread.ts";

/** Rows are brought up to date this often while a job runs; events come more often. */
const WRITE_EVERY_MS = 1_000;
const RETRY_AFTER_MS = 1_000;
/** How long a job may be claimed without being known here. */
const CLAIM_MS = 20;
const CLAIM_LOOKS = 100;

interface Running {
  abort: AbortController;
  live?: TaskProgress;
  ended: Promise<void>;
}

export interface RunnerParts extends SettleParts {
  events: JobEvents;
  threads: readonly WorkerThread[];
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
    for (let look = 0; look < CLAIM_LOOKS; look++) {
      const waiting = await queue.cancelWaiting(id);
      if (waiting) {
        this.tell(waiting);
        return;
      }
      const running = this.running.get(id);
      running?.abort.abort();
      await running?.ended;
      if (await queue.hasEnded(id)) return;
      // It was being claimed this very moment, or went back into the queue.
      await wait(CLAIM_MS);
    }
    // It says that it runs, but nobody is working on it.
    const left = await queue.cancelRunning(id);
    if (left) this.tell(left);
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
      const row = await settleJob(this.parts, job, outcome, this.stopped(running));
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

  private stopped({ abort }: Running): Stopped {
    if (!abort.signal.aborted) return undefined;
    return this.closing ? "server stops" : "cancelled";
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
