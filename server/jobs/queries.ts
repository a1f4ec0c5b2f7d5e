import { and, asc, eq, gt, inArray, or, sql } from "drizzle-orm";
import type { Db } from "#server/db/client.ts";
import { jobs } from "#server/db/schema/jobs.ts";
import type { RefusalReport } from "#shared/contract/common.ts";
import type { JobState } from "#shared/contract/jobs.ts";

export type JobRow = typeof jobs.$inferSelect;
export type NewJob = Pick<typeof jobs.$inferInsert, "id" | "teamId" | "kind" | "key" | "subject" | "ofBytes">;

/** @returns undefined when equal work is queued, running or done */
export async function insertJob(db: Db, job: NewJob): Promise<JobRow | undefined> {
  const [row] = await db.insert(jobs).values(job).onConflictDoNothing().returning();
  return row;
}

export async function findJob(db: Db, id: string): Promise<JobRow | undefined> {
  const [row] = await db.select().from(jobs).where(eq(jobs.id, id));
  return row;
}

/** The job that stands in the way of another one with its key. */
export async function findByKey(db: Db, teamId: string, key: string): Promise<JobRow | undefined> {
  const [row] = await db
    .select()
    .from(jobs)
    .where(and(eq(jobs.teamId, teamId), eq(jobs.key, key), inArray(jobs.state, ["queued", "running", "done"])));
  return row;
}

/** Takes the oldest waiting job; two that ask at the same time get two jobs. */
export async function claimOldest(db: Db): Promise<JobRow | undefined> {
  const oldest = db
    .select({ id: jobs.id })
    .from(jobs)
    .where(eq(jobs.state, "queued"))
    .orderBy(asc(jobs.createdAt))
    .limit(1)
    .for("update", { skipLocked: true });
  const now = new Date();
  const [row] = await db
    .update(jobs)
    .set({
      state: "running",
      attempts: sql`${jobs.attempts} + 1`,
      startedAt: now,
      changedAt: now,
      bytes: 0,
      layers: null,
    })
    .where(inArray(jobs.id, oldest))
    .returning();
  return row;
}

export async function updateProgress(db: Db, id: string, progress: { bytes: number; layers?: number }): Promise<void> {
  await db
    .update(jobs)
    .set(progress)
    .where(and(eq(jobs.id, id), eq(jobs.state, "running")));
}

/** @param from the states it may be in; @returns undefined when it is in another one */
export async function endJob(
  db: Db,
  id: string,
  from: JobState[],
  state: JobState,
  refusal?: RefusalReport,
): Promise<JobRow | undefined> {
  const now = new Date();
  const [row] = await db
    .update(jobs)
    .set({
      state,
      endedAt: now,
      changedAt: now,
      refusal: refusal ?? null,
      ...(state === "done" ? { bytes: sql`${jobs.ofBytes}` } : {}),
    })
    .where(and(eq(jobs.id, id), inArray(jobs.state, from)))
    .returning();
  return row;
}

/** Puts a running job back. @param uncounted the attempt was broken off by us and does not count */
export async function requeueJob(db: Db, id: string, uncounted: boolean): Promise<JobRow | undefined> {
  const [row] = await db
    .update(jobs)
    .set({
      state: "queued",
      changedAt: new Date(),
      bytes: 0,
      layers: null,
      attempts: uncounted ? sql`greatest(${jobs.attempts} - 1, 0)` : sql`${jobs.attempts}`,
    })
    .where(and(eq(jobs.id, id), eq(jobs.state, "running")))
    .returning();
  return row;
}

/** Jobs that run according to their rows; when a server starts these were broken off by the end of the one before it. */
export function listRunning(db: Db): Promise<JobRow[]> {
  return db.select().from(jobs).where(eq(jobs.state, "running"));
}

/** What a client has to know: what is waiting or running, and what has changed since it last heard. */
export function listRecent(db: Db, teamId: string, since: Date): Promise<JobRow[]> {
  return db
    .select()
    .from(jobs)
    .where(and(eq(jobs.teamId, teamId), or(inArray(jobs.state, ["queued", "running"]), gt(jobs.changedAt, since))))
    .orderBy(asc(jobs.changedAt));
}

export async function removeJobs(db: Db, ids: string[]): Promise<void> {
  if (ids.length > 0) await db.delete(jobs).where(inArray(jobs.id, ids));
}
