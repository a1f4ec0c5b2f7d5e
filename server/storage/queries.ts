import { and, inArray, isNull } from "drizzle-orm";
import type { Db } from "#server/db/client.ts";
import { readings, toolpaths } from "#server/db/schema/toolpaths.ts";
import { tunings } from "#server/db/schema/tunings.ts";

const READING_COLUMNS = [
  readings.readingSha256,
  readings.documentSha256,
  readings.tableSha256,
  readings.placesSha256,
] as const;
const TUNING_COLUMNS = [
  tunings.tunedSha256,
  tunings.planSha256,
  tunings.proofSha256,
  tunings.changesSha256,
  tunings.placesSha256,
  tunings.editsSha256,
] as const;

/** Which of the hashes any row refers to. */
export async function usedHashes(db: Db, hashes: readonly string[]): Promise<Set<string>> {
  const wanted = [...hashes];
  const used = new Set<string>();
  const add = (rows: { sha256: string | null }[]): void => {
    for (const { sha256 } of rows) if (sha256 !== null) used.add(sha256);
  };
  add(
    await db
      .select({ sha256: toolpaths.sha256 })
      .from(toolpaths)
      .where(and(inArray(toolpaths.sha256, wanted), isNull(toolpaths.refusedAt))),
  );
  for (const column of READING_COLUMNS)
    add(await db.select({ sha256: column }).from(readings).where(inArray(column, wanted)));
  for (const column of TUNING_COLUMNS)
    add(await db.select({ sha256: column }).from(tunings).where(inArray(column, wanted)));
  return used;
}
