import { bigint, foreignKey, index, integer, pgTable, text, uuid } from "drizzle-orm/pg-core";
import { createdAt, jsonText, rowId } from "#server/db/schema/columns.ts";
import { documentVersions } from "#server/db/schema/documents.ts";
import { jobs } from "#server/db/schema/jobs.ts";
import { teams, users } from "#server/db/schema/teams.ts";
import { readings } from "#server/db/schema/toolpaths.ts";
import type { Tuning } from "#shared/contract/tunings.ts";

/** One application of a profile version to a reading. Its state is that of its job; rows are never removed. */
export const tunings = pgTable(
  "tunings",
  {
    id: rowId(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    readingId: uuid("reading_id")
      .notNull()
      .references(() => readings.id),
    profileId: uuid("profile_id").notNull(),
    profileVersion: integer("profile_version").notNull(),
    /** the polymer card the profile was held against, where the team has one under that name */
    polymerId: uuid("polymer_id"),
    polymerVersion: integer("polymer_version"),
    status: text("status").$type<Tuning["status"]>().notNull(),
    engine: text("engine").notNull(),
    jobId: uuid("job_id")
      .notNull()
      .references(() => jobs.id),
    createdBy: uuid("created_by")
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    planned: jsonText<NonNullable<Tuning["plan"]>>("planned"),
    proven: jsonText<NonNullable<Tuning["proof"]>>("proven"),
    /** set only when the proof passed */
    tunedSha256: text("tuned_sha256"),
    tunedBytes: bigint("tuned_bytes", { mode: "number" }),
    planSha256: text("plan_sha256"),
    proofSha256: text("proof_sha256"),
    changesSha256: text("changes_sha256"),
    placesSha256: text("places_sha256"),
    editsSha256: text("edits_sha256"),
  },
  (table) => [
    index("tunings_team").on(table.teamId, table.createdAt),
    index("tunings_reading").on(table.readingId),
    index("tunings_job").on(table.jobId),
    foreignKey({
      name: "tunings_profile_version",
      columns: [table.profileId, table.profileVersion],
      foreignColumns: [documentVersions.documentId, documentVersions.number],
    }),
    foreignKey({
      name: "tunings_polymer_version",
      columns: [table.polymerId, table.polymerVersion],
      foreignColumns: [documentVersions.documentId, documentVersions.number],
    }),
  ],
);
