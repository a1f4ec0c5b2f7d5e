import { index, pgTable, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { createdAt, moment, rowId } from "#server/db/schema/columns.ts";
import type { Role } from "#shared/contract/roles.ts";

export const teams = pgTable("teams", {
  id: rowId(),
  name: text("name").notNull(),
  createdAt: createdAt(),
});

/** A person belongs to one team. */
export const users = pgTable(
  "users",
  {
    id: rowId(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    /** in lower case */
    email: text("email").notNull(),
    name: text("name"),
    role: text("role").$type<Role>().notNull(),
    /** argon2id, with its parameters and salt */
    passwordHash: text("password_hash").notNull(),
    createdAt: createdAt(),
  },
  (table) => [uniqueIndex("users_email").on(table.email), index("users_team").on(table.teamId)],
);

/** A signed-in browser; removing the row signs it out. */
export const sessions = pgTable(
  "sessions",
  {
    id: rowId(),
    userId: uuid("user_id")
      .notNull()
      .references(() => users.id, { onDelete: "cascade" }),
    createdAt: createdAt(),
    lastSeenAt: moment("last_seen_at").notNull(),
    /** whatever happens, the session ends here */
    expiresAt: moment("expires_at").notNull(),
  },
  (table) => [index("sessions_user").on(table.userId)],
);
