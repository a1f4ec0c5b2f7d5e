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
  close(): Promise<void>;
}

/** A real database of its own, in memory, migrated and empty. One for a test file is enough: clear it between tests. */
export async function openTestDatabase(): Promise<TestDatabase> {
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
    close: () => client.close(),
  };
}
