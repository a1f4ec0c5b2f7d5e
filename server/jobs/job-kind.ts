import type { Db } from "#server/db/client.ts";
import type { JobRow } from "#server/jobs/queries.ts";
import type { ResultOf, Task } from "#server/jobs/tasks.ts";
import type { Staged } from "#server/storage/storage.ts";

/** What the feature that a job belongs to knows about it. */
export interface JobKind<Kind extends Task["kind"]> {
  /** everything the worker needs, from the rows the job is about */
  task(db: Db, job: JobRow): Promise<Extract<Task, { kind: Kind }>>;
  /** what the rows will refer to */
  staged(result: ResultOf<Kind>): Staged[];
  /** writes the rows; its bytes are in place, and the job ends in the same transaction */
  done(tx: Db, job: JobRow, result: ResultOf<Kind>): Promise<void>;
  /** writes what a refusal means for the rows, if it means anything; returns digests that may be unused now */
  refused?(tx: Db, job: JobRow): Promise<string[]>;
}

export type JobKinds = { [Kind in Task["kind"]]: JobKind<Kind> };
