import { join } from "node:path";
import { JobEvents } from "#server/jobs/job-events.ts";
import { DatabaseQueue, type JobQueue } from "#server/jobs/job-queue.ts";
import { JobRunner } from "#server/jobs/job-runner.ts";
import { jobView } from "#server/jobs/job-view.ts";
import type { JobRow } from "#server/jobs/queries.ts";
import { type WorkerLimits, WorkerThread } from "#server/jobs/worker-thread.ts";
import type { Parts } from "#server/parts.ts";
import { LocalStorage } from "#server/storage/local-storage.ts";
import { usedHashes } from "#server/storage/queries.ts";
import { Shelf } from "#server/storage/shelf.ts";
import { readKind } from "#server/toolpaths/read-kind.ts";
import { tuneKind } from "#server/tunings/tune-kind.ts";

const LIMITS: WorkerLimits = { silenceMs: 120_000, cancelMs: 2_000 };

/** Stored bytes, and the jobs that are done on them. */
export interface Workshop {
  shelf: Shelf;
  queue: JobQueue;
  events: JobEvents;
  runner: JobRunner;
  /** Says that a job has been enqueued, once the transaction that did so is through. */
  announce(job: JobRow): void;
  /** Begins to work, taking up what an earlier server left. */
  start(): Promise<void>;
  /** Stops working. The database must still be open. */
  close(): Promise<void>;
}

/** Opens the storage below the data folder and removes what an earlier run left half done. */
export async function openWorkshop(
  { env, log, db }: Pick<Parts, "env" | "log" | "db">,
  limits: WorkerLimits = LIMITS,
): Promise<Workshop> {
  const storageRoot = join(env.DATA_DIR, "files");
  const shelf = new Shelf(await LocalStorage.open(storageRoot), (hashes) => usedHashes(db, hashes));
  await shelf.sweep();
  const queue = new DatabaseQueue(db);
  const events = new JobEvents();
  const threads = Array.from({ length: env.WORKERS }, () => new WorkerThread({ storageRoot }, limits));
  const kinds = { read: readKind, tune: tuneKind };
  const runner = new JobRunner({ db, log, queue, shelf, events, threads, kinds });
  const announce = (job: JobRow): void => {
    events.tell(job.teamId, jobView(job));
    runner.wake();
  };
  return { shelf, queue, events, runner, announce, start: () => runner.start(), close: () => runner.close() };
}
