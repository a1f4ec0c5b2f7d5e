import { join } from "node:path";
import type { PgliteDatabase } from "drizzle-orm/pglite";
import { migrate as apply } from "drizzle-orm/pglite/migrator";
import { ROOT } from "#server/root.ts";

/** Applies the migrations that a database has not seen, in order. */
export async function migrate(db: PgliteDatabase): Promise<void> {
  await apply(db, { migrationsFolder: join(ROOT, "server", "db", "migrations") });
}
