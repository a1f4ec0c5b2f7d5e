import type { Db } from "#server/db/client.ts";
import { notFound } from "#server/http/app-error.ts";
import { jobView } from "#server/jobs/job-view.ts";
import * as queries from "#server/jobs/queries.ts";
import type { Workshop } from "#server/jobs/workshop.ts";
import type { Job } from "#shared/contract/jobs.ts";

/** @throws AppError `not-found`, here and below also for what belongs to another team */
export async function get(db: Db, { runner }: Workshop, teamId: string, id: string): Promise<Job> {
  return jobView(await find(db, teamId, id), runner.liveProgress(id));
}

/** Ends a job and waits until it has. One that has ended already stays as it is. */
export async function cancel(db: Db, workshop: Workshop, teamId: string, id: string): Promise<Job> {
  await find(db, teamId, id);
  await workshop.runner.cancel(id);
  return get(db, workshop, teamId, id);
}

/** What waits or runs, and what has changed since. */
export async function recent(db: Db, { runner }: Workshop, teamId: string, since: Date): Promise<Job[]> {
  const rows = await queries.listRecent(db, teamId, since);
  return rows.map((row) => jobView(row, runner.liveProgress(row.id)));
}

async function find(db: Db, teamId: string, id: string): Promise<queries.JobRow> {
  const row = await queries.findJob(db, id);
  if (!row || row.teamId !== teamId) throw notFound("job");
  return row;
}
