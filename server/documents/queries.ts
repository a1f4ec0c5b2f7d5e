import { and, asc, desc, eq, ne } from "drizzle-orm";
import { alias } from "drizzle-orm/pg-core";
import type { Db } from "#server/db/client.ts";
import { approvals, type DocumentKind, documents, documentVersions } from "#server/db/schema/documents.ts";
import { users } from "#server/db/schema/teams.ts";

const approvers = alias(users, "approvers");

const HEAD = {
  documentId: documents.id,
  name: documents.name,
  number: documentVersions.number,
  note: documentVersions.note,
  createdAt: documentVersions.createdAt,
  createdBy: users.email,
  approvedAt: approvals.approvedAt,
  approvedBy: approvers.email,
};

/** Which documents: those of a team and kind, or one of them. */
export interface Scope {
  teamId: string;
  kind: DocumentKind;
  id?: string;
}

const inScope = ({ teamId, kind, id }: Scope) =>
  and(eq(documents.teamId, teamId), eq(documents.kind, kind), id === undefined ? undefined : eq(documents.id, id));

const heads = (db: Db) =>
  db
    .select(HEAD)
    .from(documents)
    .innerJoin(documentVersions, eq(documentVersions.documentId, documents.id))
    .innerJoin(users, eq(users.id, documentVersions.createdBy))
    .leftJoin(
      approvals,
      and(eq(approvals.documentId, documentVersions.documentId), eq(approvals.number, documentVersions.number)),
    )
    .leftJoin(approvers, eq(approvers.id, approvals.approvedBy));

export type HeadRow = Awaited<ReturnType<typeof heads>>[number];

/** Every version of the documents in scope: by name, and the latest first. */
export function listHeads(db: Db, scope: Scope): Promise<HeadRow[]> {
  return heads(db).where(inScope(scope)).orderBy(asc(documents.name), desc(documentVersions.number));
}

/** The latest document of each in scope. */
export function listLatestTexts(db: Db, scope: Scope) {
  return db
    .selectDistinctOn([documentVersions.documentId], {
      documentId: documentVersions.documentId,
      text: documentVersions.text,
    })
    .from(documentVersions)
    .innerJoin(documents, eq(documents.id, documentVersions.documentId))
    .where(inScope(scope))
    .orderBy(documentVersions.documentId, desc(documentVersions.number));
}

/** One version; without a number the latest. */
export async function findHead(db: Db, scope: Required<Scope>, number?: number): Promise<HeadRow | undefined> {
  const [row] = await heads(db)
    .where(and(inScope(scope), number === undefined ? undefined : eq(documentVersions.number, number)))
    .orderBy(desc(documentVersions.number))
    .limit(1);
  return row;
}

/** The document of a version that is known to be there. */
export async function getText(db: Db, { documentId, number }: Pick<HeadRow, "documentId" | "number">) {
  const [row] = await db
    .select({ text: documentVersions.text, sha256: documentVersions.sha256 })
    .from(documentVersions)
    .where(and(eq(documentVersions.documentId, documentId), eq(documentVersions.number, number)));
  return row;
}

/** Id of the team's document of a kind with a name, other than `except`. */
export async function findNamed(db: Db, { teamId, kind, id: except }: Scope, name: string) {
  const [row] = await db
    .select({ id: documents.id })
    .from(documents)
    .where(
      and(
        inScope({ teamId, kind }),
        eq(documents.name, name),
        except === undefined ? undefined : ne(documents.id, except),
      ),
    );
  return row?.id;
}

export async function insertDocument(db: Db, document: { teamId: string; kind: DocumentKind; name: string }) {
  const [row] = await db.insert(documents).values(document).onConflictDoNothing().returning({ id: documents.id });
  return row?.id;
}

export async function updateName(db: Db, id: string, name: string): Promise<void> {
  await db.update(documents).set({ name }).where(eq(documents.id, id));
}

/** False when the number is taken: somebody else was faster. */
export async function insertVersion(
  db: Db,
  version: Omit<typeof documentVersions.$inferInsert, "createdAt">,
): Promise<boolean> {
  const rows = await db
    .insert(documentVersions)
    .values(version)
    .onConflictDoNothing()
    .returning({ number: documentVersions.number });
  return rows.length > 0;
}

/** An approval stays with whom gave it first. */
export async function insertApproval(
  db: Db,
  approval: { documentId: string; number: number; approvedBy: string },
): Promise<void> {
  await db.insert(approvals).values(approval).onConflictDoNothing();
}
