import type { Db } from "#server/db/client.ts";
import type { JobRow, NewJob } from "#server/jobs/queries.ts";
import * as queries from "#server/jobs/queries.ts";
import type { TaskProgress } from "#server/jobs/tasks.ts";
import type { RefusalReport } from "#shared/contract/common.ts";

/** A job that was begun this often without coming to an end is given up. */
export const MOST_ATTEMPTS = 3;

export interface Enqueued {
  job: JobRow;
  /** false: equal work was queued, running or done already, and this is its job */
  isNew: boolean;
}

/**
 * Work to be done, kept where it outlives the server. A job is claimed by one runner, reports progress, and ends once;
 * one that the end of a server broke off is begun again, which every job must bear.
 */
export interface JobQueue {
  /** @param tx the transaction that also writes the rows the job is about */
  enqueue(tx: Db, job: NewJob): Promise<Enqueued>;
  claim(): Promise<JobRow | undefined>;
  progress(id: string, progress: TaskProgress): Promise<void>;
  /** @param tx the transaction that also writes what came of it */
  finish(tx: Db, id: string): Promise<JobRow | undefined>;
  refuse(tx: Db, id: string, refusal: RefusalReport): Promise<JobRow | undefined>;
  /** Begins it again later, or gives it up after too many attempts. */
  fail(job: JobRow): Promise<JobRow | undefined>;
  /** Ends a job that waits; undefined where it doesn't. */
  cancelWaiting(id: string): Promise<JobRow | undefined>;
  cancelRunning(id: string): Promise<JobRow | undefined>;
  /** Puts a job back that this server breaks off because it stops. */
  giveBack(id: string): Promise<JobRow | undefined>;
  hasEnded(id: string): Promise<boolean>;
  /** At the start: what an earlier server was working on when it ended. */
  recover(): Promise<JobRow[]>;
}

export class DatabaseQueue implements JobQueue {
  private readonly db: Db;

  constructor(db: Db) {
    this.db = db;
  }

  async enqueue(tx: Db, job: NewJob): Promise<Enqueued> {
    // What stands in the way may end between the two looks; then there is room.
    for (;;) {
      const inserted = await queries.insertJob(tx, job);
      if (inserted) return { job: inserted, isNew: true };
      const equal = await queries.findByKey(tx, job.teamId, job.key);
      if (equal) return { job: equal, isNew: false };
    }
  }

  claim(): Promise<JobRow | undefined> {
    return queries.claimOldest(this.db);
  }

  progress(id: string, progress: TaskProgress): Promise<void> {
    return queries.updateProgress(this.db, id, progress);
  }

  finish(tx: Db, id: string): Promise<JobRow | undefined> {
    return queries.endJob(tx, id, ["running"], "done");
  }

  refuse(tx: Db, id: string, refusal: RefusalReport): Promise<JobRow | undefined> {
    return queries.endJob(tx, id, ["running"], "refused", refusal);
  }

  fail(job: JobRow): Promise<JobRow | undefined> {
    if (job.attempts < MOST_ATTEMPTS) return queries.requeueJob(this.db, job.id, false);
    return queries.endJob(this.db, job.id, ["running"], "failed", gaveUp(job));
  }

  cancelWaiting(id: string): Promise<JobRow | undefined> {
    return queries.endJob(this.db, id, ["queued"], "cancelled");
  }

  cancelRunning(id: string): Promise<JobRow | undefined> {
    return queries.endJob(this.db, id, ["running"], "cancelled");
  }

  giveBack(id: string): Promise<JobRow | undefined> {
    return queries.requeueJob(this.db, id, true);
  }

  async hasEnded(id: string): Promise<boolean> {
    const job = await queries.findJob(this.db, id);
    return job === undefined || !["queued", "running"].includes(job.state);
  }

  async recover(): Promise<JobRow[]> {
    const changed: JobRow[] = [];
    for (const job of await queries.listRunning(this.db)) {
      const row = await this.fail(job);
      if (row) changed.push(row);
    }
    return changed;
  }
}

const gaveUp = ({ kind, attempts }: JobRow): RefusalReport => ({
  code: "gave-up",
  message: `${kind === "read" ? "Reading" : "Tuning"} this file was begun ${attempts} times and never came to an end. That is a fault of ours.`,
  remedy: "Tell whoever runs this server: its log says what happened each time.",
  place: {},
});
