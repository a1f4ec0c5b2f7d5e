import { existsSync } from "node:fs";
import { mkdir } from "node:fs/promises";
import { join, resolve } from "node:path";
import { PGlite } from "@electric-sql/pglite";
import type { PgDatabase, PgQueryResultHKT } from "drizzle-orm/pg-core";
import { drizzle } from "drizzle-orm/pglite";
import { takeLock } from "#server/db/lock.ts";
import { makeDatabase } from "#server/db/make-database.ts";
import { migrate } from "#server/db/migrate.ts";

/**
 * The database, or a transaction in it. There is one connection: inside `db.transaction(async (tx) => …)` only `tx` may
 * be used, since a query on `db` would wait for the transaction for ever.
 */
export type Db = PgDatabase<PgQueryResultHKT>;

export interface OpenDatabase {
  db: Db;
  /** writes out what is pending and gives the folder free */
  close(): Promise<void>;
}

/**
 * Opens the database below the data folder, making it where there is none and bringing it up to date first.
 *
 * @throws AlreadyOpen when another process has it open
 */
export async function openDatabase(dataDir: string): Promise<OpenDatabase> {
  // PGlite leaves its files readable for everybody, so the folder above them is closed to others.
  await mkdir(dataDir, { recursive: true, mode: 0o700 });
  const lock = takeLock(join(dataDir, "database.lock"));
  let client: PGlite | undefined;
  try {
    const folder = resolve(dataDir, "database");
    if (!existsSync(folder)) await makeDatabase(folder);
    client = await PGlite.create(folder);
    const db = drizzle(client);
    await migrate(db);
    const opened = client;
    return {
      db,
      close: async () => {
        await opened.close();
        lock.release();
      },
    };
  } catch (error) {
    await client?.close();
    lock.release();
    throw error;
  }
}
