import { and, desc, eq } from "drizzle-orm";
import { alias } from "drizzle-orm/pg-core";
import type { Db } from "#server/db/client.ts";
import { documents } from "#server/db/schema/documents.ts";
import { jobs } from "#server/db/schema/jobs.ts";
import { users } from "#server/db/schema/teams.ts";
import { readings, toolpaths } from "#server/db/schema/toolpaths.ts";
import { tunings } from "#server/db/schema/tunings.ts";

export type NewTuning = typeof tunings.$inferInsert;

const machineDocuments = alias(documents, "machine_documents");
const profileDocuments = alias(documents, "profile_documents");

const tuningsWithNames = (db: Db) =>
  db
    .select({
      tuning: tunings,
      reading: readings,
      toolpath: toolpaths,
      job: jobs,
      machineName: machineDocuments.name,
      profileName: profileDocuments.name,
      createdBy: users.email,
    })
    .from(tunings)
    .innerJoin(readings, eq(readings.id, tunings.readingId))
    .innerJoin(toolpaths, eq(toolpaths.id, readings.toolpathId))
    .innerJoin(jobs, eq(jobs.id, tunings.jobId))
    .innerJoin(machineDocuments, eq(machineDocuments.id, readings.machineId))
    .innerJoin(profileDocuments, eq(profileDocuments.id, tunings.profileId))
    .innerJoin(users, eq(users.id, tunings.createdBy));

export type TuningRow = Awaited<ReturnType<typeof tuningsWithNames>>[number];

/** The latest first. */
export function listTunings(db: Db, teamId: string): Promise<TuningRow[]> {
  return tuningsWithNames(db).where(eq(tunings.teamId, teamId)).orderBy(desc(tunings.createdAt));
}

export async function hasTunings(db: Db, teamId: string): Promise<boolean> {
  return (await db.select({ id: tunings.id }).from(tunings).where(eq(tunings.teamId, teamId)).limit(1)).length > 0;
}

export async function findTuning(db: Db, teamId: string, id: string): Promise<TuningRow | undefined> {
  const [row] = await tuningsWithNames(db).where(and(eq(tunings.teamId, teamId), eq(tunings.id, id)));
  return row;
}

export async function insertTuning(db: Db, tuning: NewTuning): Promise<void> {
  await db.insert(tunings).values(tuning);
}

export async function updateTuning(db: Db, id: string, result: Partial<NewTuning>): Promise<void> {
  await db.update(tunings).set(result).where(eq(tunings.id, id));
}
