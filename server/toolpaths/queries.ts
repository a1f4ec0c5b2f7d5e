import { and, desc, eq, inArray, isNull } from "drizzle-orm";
import type { Db } from "#server/db/client.ts";
import { documents } from "#server/db/schema/documents.ts";
import { jobs } from "#server/db/schema/jobs.ts";
import { users } from "#server/db/schema/teams.ts";
import { readings, toolpaths } from "#server/db/schema/toolpaths.ts";
import { tunings } from "#server/db/schema/tunings.ts";

export type NewToolpath = typeof toolpaths.$inferInsert;
export type NewReading = typeof readings.$inferInsert;
export type ReadingFiles = Pick<NewReading, "readingSha256" | "documentSha256" | "tableSha256" | "placesSha256">;

const toolpathsWithUploader = (db: Db) =>
  db
    .select({ toolpath: toolpaths, createdBy: users.email })
    .from(toolpaths)
    .innerJoin(users, eq(users.id, toolpaths.createdBy));

export type ToolpathRow = Awaited<ReturnType<typeof toolpathsWithUploader>>[number];

/** The latest first; what was refused is left out. */
export function listToolpaths(db: Db, teamId: string): Promise<ToolpathRow[]> {
  return toolpathsWithUploader(db)
    .where(and(eq(toolpaths.teamId, teamId), isNull(toolpaths.refusedAt)))
    .orderBy(desc(toolpaths.createdAt));
}

export async function findToolpath(db: Db, teamId: string, id: string): Promise<ToolpathRow | undefined> {
  const [row] = await toolpathsWithUploader(db).where(and(eq(toolpaths.teamId, teamId), eq(toolpaths.id, id)));
  return row;
}

const readingsWithJob = (db: Db) =>
  db
    .select({ reading: readings, toolpath: toolpaths, machineName: documents.name, job: jobs })
    .from(readings)
    .innerJoin(toolpaths, eq(toolpaths.id, readings.toolpathId))
    .innerJoin(documents, eq(documents.id, readings.machineId))
    .innerJoin(jobs, eq(jobs.id, readings.jobId));

export type ReadingRow = Awaited<ReturnType<typeof readingsWithJob>>[number];

/** Readings of these toolpaths, the latest first. */
export async function listReadings(db: Db, toolpathIds: string[]): Promise<ReadingRow[]> {
  if (toolpathIds.length === 0) return [];
  return readingsWithJob(db).where(inArray(readings.toolpathId, toolpathIds)).orderBy(desc(readings.createdAt));
}

export async function findReading(db: Db, teamId: string, id: string): Promise<ReadingRow | undefined> {
  const [row] = await readingsWithJob(db).where(and(eq(toolpaths.teamId, teamId), eq(readings.id, id)));
  return row;
}

export async function insertToolpath(db: Db, toolpath: NewToolpath): Promise<void> {
  await db.insert(toolpaths).values(toolpath);
}

export async function insertReading(db: Db, reading: NewReading): Promise<void> {
  await db.insert(readings).values(reading);
}

export async function updateReading(
  db: Db,
  id: string,
  result: ReadingFiles & Pick<NewReading, "summary">,
): Promise<void> {
  await db.update(readings).set(result).where(eq(readings.id, id));
}

export async function markRefused(db: Db, toolpathId: string): Promise<void> {
  await db.update(toolpaths).set({ refusedAt: new Date() }).where(eq(toolpaths.id, toolpathId));
}

export function countTunings(db: Db, readingIds: string[]): Promise<number> {
  return readingIds.length === 0 ? Promise.resolve(0) : db.$count(tunings, inArray(tunings.readingId, readingIds));
}

/** Its readings go with it. */
export async function removeToolpath(db: Db, id: string): Promise<void> {
  await db.delete(toolpaths).where(eq(toolpaths.id, id));
}
