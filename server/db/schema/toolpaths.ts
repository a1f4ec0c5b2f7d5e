import { bigint, foreignKey, index, integer, pgTable, text, uuid } from "drizzle-orm/pg-core";
import { createdAt, jsonText, moment, rowId } from "#server/db/schema/columns.ts";
import { documentVersions } from "#server/db/schema/documents.ts";
import { jobs } from "#server/db/schema/jobs.ts";
import { teams, users } from "#server/db/schema/teams.ts";
import type { Reading } from "#shared/contract/toolpaths.ts";

/** An uploaded file; its bytes are in the storage under their digest. */
export const toolpaths = pgTable(
  "toolpaths",
  {
    id: rowId(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    name: text("name").notNull(),
    sha256: text("sha256").notNull(),
    bytes: bigint("bytes", { mode: "number" }).notNull(),
    createdBy: uuid("created_by")
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    /** set when its first reading was refused: it is no toolpath, its bytes are gone, and it is not listed */
    refusedAt: moment("refused_at"),
  },
  (table) => [index("toolpaths_team").on(table.teamId, table.createdAt), index("toolpaths_sha256").on(table.sha256)],
);

/** A toolpath read with one version of a machine. Its state is that of its job. */
export const readings = pgTable(
  "readings",
  {
    id: rowId(),
    toolpathId: uuid("toolpath_id")
      .notNull()
      .references(() => toolpaths.id, { onDelete: "cascade" }),
    machineId: uuid("machine_id").notNull(),
    machineVersion: integer("machine_version").notNull(),
    jobId: uuid("job_id")
      .notNull()
      .references(() => jobs.id),
    createdBy: uuid("created_by")
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    summary: jsonText<NonNullable<Reading["summary"]>>("summary"),
    // Digests of what the job left in the storage.
    readingSha256: text("reading_sha256"),
    documentSha256: text("document_sha256"),
    tableSha256: text("table_sha256"),
    placesSha256: text("places_sha256"),
  },
  (table) => [
    index("readings_toolpath").on(table.toolpathId),
    index("readings_job").on(table.jobId),
    foreignKey({
      name: "readings_machine_version",
      columns: [table.machineId, table.machineVersion],
      foreignColumns: [documentVersions.documentId, documentVersions.number],
    }),
  ],
);
