import type { Logger } from "pino";
import type { Db } from "#server/db/client.ts";
import type { JobKind, JobKinds } from "#server/jobs/job-kind.ts";
import type { JobQueue } from "#server/jobs/job-queue.ts";
import type { JobRow } from "#server/jobs/queries.ts";
import type { TaskResult } from "#server/jobs/tasks.ts";
import type { Outcome } from "#server/jobs/worker-thread.ts";
import type { Shelf } from "#server/storage/shelf.ts";
import type { RefusalReport } from "#shared/contract/common.ts";

export interface SettleParts {
  db: Db;
  log: Logger;
  queue: JobQueue;
  shelf: Shelf;
  kinds: JobKinds;
}

/** Why a job was told to stop, if it was: somebody cancelled it, or the server stops and another one begins it again. */
export type Stopped = "cancelled" | "server stops" | undefined;

/** Writes down how a job ended, together with what came of it. @returns its row, where the job was still running */
export async function settleJob(
  parts: SettleParts,
  job: JobRow,
  outcome: Outcome,
  stopped: Stopped,
): Promise<JobRow | undefined> {
  const { queue, shelf, log } = parts;
  switch (outcome.end) {
    case "done":
      return record(parts, job, outcome.result);
    case "refused":
      return refuse(parts, job, outcome.refusal);
    case "cancelled":
      await shelf.storage.discardOf(job.id);
      return stopped === "server stops" ? queue.giveBack(job.id) : queue.cancelRunning(job.id);
    case "failed":
      log.error({ job: job.id, kind: job.kind, attempt: job.attempts, reason: outcome.reason }, "a job failed");
      await shelf.storage.discardOf(job.id);
      return stopped === "cancelled" ? queue.cancelRunning(job.id) : queue.fail(job);
  }
}

function record(
  { db, queue, shelf, kinds }: SettleParts,
  job: JobRow,
  result: TaskResult,
): Promise<JobRow | undefined> {
  // The worker answers a task of one kind with a result of that kind.
  const kind = kinds[result.kind] as JobKind<TaskResult["kind"]>;
  return shelf.keep(kind.staged(result), () =>
    db.transaction(async (tx) => {
      await kind.done(tx, job, result);
      return queue.finish(tx, job.id);
    }),
  );
}

async function refuse(
  { db, queue, shelf, kinds }: SettleParts,
  job: JobRow,
  refusal: RefusalReport,
): Promise<JobRow | undefined> {
  let unused: string[] = [];
  const row = await db.transaction(async (tx) => {
    unused = (await kinds[job.kind].refused?.(tx, job)) ?? [];
    return queue.refuse(tx, job.id, refusal);
  });
  await shelf.release(unused);
  return row;
}
