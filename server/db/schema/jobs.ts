import { sql } from "drizzle-orm";
import { bigint, index, integer, pgTable, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { createdAt, jsonText, moment, rowId } from "#server/db/schema/columns.ts";
import { teams } from "#server/db/schema/teams.ts";
import type { RefusalReport } from "#shared/contract/common.ts";
import type { Job, JobState } from "#shared/contract/jobs.ts";

/** Rows that a job is about. */
export type JobSubject = Pick<Job, "toolpathId" | "readingId" | "tuningId">;

/** The queue, and the record of what was done. */
export const jobs = pgTable(
  "jobs",
  {
    id: rowId(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    kind: text("kind").$type<Job["kind"]>().notNull(),
    /** equal keys are equal work: it is queued, running or done at most once */
    key: text("key").notNull(),
    subject: jsonText<JobSubject>("subject").notNull(),
    state: text("state").$type<JobState>().notNull().default("queued"),
    /** how often it was begun */
    attempts: integer("attempts").notNull().default(0),
    bytes: bigint("bytes", { mode: "number" }).notNull().default(0),
    ofBytes: bigint("of_bytes", { mode: "number" }).notNull(),
    layers: integer("layers"),
    /** of state refused; of state failed what to tell the people who wait for it */
    refusal: jsonText<RefusalReport>("refusal"),
    createdAt: createdAt(),
    startedAt: moment("started_at"),
    endedAt: moment("ended_at"),
    /** any change of state; what a client that was away asks for */
    changedAt: moment("changed_at")
      .notNull()
      .$defaultFn(() => new Date()),
  },
  (table) => [
    uniqueIndex("jobs_key").on(table.teamId, table.key).where(sql`${table.state} in ('queued', 'running', 'done')`),
    index("jobs_waiting").on(table.createdAt).where(sql`${table.state} = 'queued'`),
    index("jobs_changed").on(table.teamId, table.changedAt),
  ],
);
