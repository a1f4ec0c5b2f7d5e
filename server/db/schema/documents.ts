import { foreignKey, index, integer, pgTable, primaryKey, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { createdAt, jsonText, rowId } from "#server/db/schema/columns.ts";
import { teams, users } from "#server/db/schema/teams.ts";

export type DocumentKind = "machine" | "polymer" | "profile";

/** A machine, polymer or profile: what its versions have in common. */
export const documents = pgTable(
  "documents",
  {
    id: rowId(),
    teamId: uuid("team_id")
      .notNull()
      .references(() => teams.id),
    kind: text("kind").$type<DocumentKind>().notNull(),
    /** as in the latest version; no two documents of a kind share it */
    name: text("name").notNull(),
    createdAt: createdAt(),
  },
  (table) => [uniqueIndex("documents_name").on(table.teamId, table.kind, table.name)],
);

/** Rows are only ever added. */
export const documentVersions = pgTable(
  "document_versions",
  {
    documentId: uuid("document_id")
      .notNull()
      .references(() => documents.id),
    /** 1, 2, 3 … without gaps */
    number: integer("number").notNull(),
    /** the document as its write function puts it, defaults filled in: equal documents are equal text */
    text: text("text").notNull(),
    /** digest of the text, which proofs name */
    sha256: text("sha256").notNull(),
    note: text("note"),
    createdBy: uuid("created_by")
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.documentId, table.number] })],
);

/** Who released a profile version for parts that ship. */
export const approvals = pgTable(
  "approvals",
  {
    documentId: uuid("document_id").notNull(),
    number: integer("number").notNull(),
    approvedBy: uuid("approved_by")
      .notNull()
      .references(() => users.id),
    approvedAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.documentId, table.number] }),
    foreignKey({
      name: "approvals_version",
      columns: [table.documentId, table.number],
      foreignColumns: [documentVersions.documentId, documentVersions.number],
    }),
  ],
);

/** A person's ticked checklist for one version of a machine. */
export const acknowledgements = pgTable(
  "acknowledgements",
  {
    userId: uuid("user_id")
      .notNull()
      .references(() => users.id),
    machineId: uuid("machine_id").notNull(),
    machineVersion: integer("machine_version").notNull(),
    checklist: jsonText<string[]>("checklist").notNull(),
    at: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.userId, table.machineId, table.machineVersion] }),
    index("acknowledgements_machine").on(table.machineId, table.machineVersion),
    foreignKey({
      name: "acknowledgements_version",
      columns: [table.machineId, table.machineVersion],
      foreignColumns: [documentVersions.documentId, documentVersions.number],
    }),
  ],
);
