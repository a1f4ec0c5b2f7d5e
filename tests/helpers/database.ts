import { readFile } from "node:fs/promises";
import { PGlite } from "@electric-sql/pglite";
import { sql } from "drizzle-orm";
import { drizzle } from "drizzle-orm/pglite";
import { inject } from "vitest";
import type { Db } from "#server/db/client.ts";

export interface TestDatabase {
  db: Db;
  /** empties every table */
  clear(): Promise<void>;
}

let opened: Promise<TestDatabase> | undefined;

/**
 * A real database in memory, migrated. Starting one costs more than all tests of a file, so the files that one worker
 * runs, one after the other, share it: clear it between tests.
 */
export function openTestDatabase(): Promise<TestDatabase> {
  opened ??= open();
  return opened;
}

async function open(): Promise<TestDatabase> {
  const snapshot = await readFile(inject("migratedDatabase"));
  const client = await PGlite.create({ loadDataDir: new Blob([new Uint8Array(snapshot)]) });
  const db = drizzle(client);
  const { rows } = await client.query<{ name: string }>(
    "select tablename as name from pg_tables where schemaname = 'public'",
  );
  const tables = rows.map(({ name }) => `"${name}"`).join(", ");
  return {
    db,
    clear: async () => {
      await db.execute(sql.raw(`truncate ${tables} cascade`));
    },
  };
}
