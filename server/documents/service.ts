import { createHash } from "node:crypto";
import type { Db } from "#server/db/client.ts";
import type { DocumentKind } from "#server/db/schema/documents.ts";
import * as queries from "#server/documents/queries.ts";
import type { Actor } from "#server/http/actor.ts";
import { AppError, notFound } from "#server/http/app-error.ts";
import type { DocumentHistory, DocumentSummary, VersionHead } from "#shared/contract/documents.ts";

/** What differs between machines, polymers and profiles. */
export interface Format<Document> {
  kind: DocumentKind;
  nameOf(document: Document): string;
  parse(json: unknown): Document;
  /** what the document says; equal documents give equal text. A version that it came with is left out: the team numbers its own */
  write(document: Document): string;
  /** what lists show of it */
  gist(document: Document): Pick<DocumentSummary, "machine" | "profile" | "polymer">;
}

/** One version with its document. */
export interface Version<Document> extends VersionHead {
  id: string;
  document: Document;
}

/** A version as the rest of the server works with it. */
export interface StoredVersion<Document> {
  id: string;
  number: number;
  document: Document;
  /** digest of its text */
  sha256: string;
  approved: boolean;
}

type Writer = Pick<Actor, "userId" | "teamId">;
interface Draft<Document> {
  document: Document;
  note?: string;
}

/** The versions of one kind of document. Versions are added, never changed or removed. */
export class Documents<Document> {
  readonly format: Format<Document>;

  constructor(format: Format<Document>) {
    this.format = format;
  }

  async list(db: Db, teamId: string): Promise<DocumentSummary[]> {
    const scope = { teamId, kind: this.format.kind };
    const [heads, texts] = await Promise.all([queries.listHeads(db, scope), queries.listLatestTexts(db, scope)]);
    const textOf = new Map(texts.map(({ documentId, text }) => [documentId, text]));
    return byDocument(heads).map((versions) => ({
      id: versions[0].documentId,
      name: versions[0].name,
      versions: versions.length,
      latest: headOf(versions[0]),
      ...(this.format.kind === "profile" && { approved: approvedNumbers(versions) }),
      ...this.gist(textOf.get(versions[0].documentId)),
    }));
  }

  /** @throws AppError `not-found`, here and below also for what belongs to another team */
  async history(db: Db, teamId: string, id: string): Promise<DocumentHistory> {
    const versions = await queries.listHeads(db, { teamId, kind: this.format.kind, id });
    if (versions.length === 0) throw notFound(this.format.kind);
    return { id, name: versions[0].name, versions: versions.map(headOf) };
  }

  async version(db: Db, teamId: string, id: string, number: number): Promise<Version<Document>> {
    const head = await this.find(db, teamId, id, number);
    return { id, ...headOf(head), document: (await this.read(db, head)).document };
  }

  /** Without a number, the latest version. */
  async stored(db: Db, teamId: string, id: string, number?: number): Promise<StoredVersion<Document>> {
    const head = await this.find(db, teamId, id, number);
    return { id, number: head.number, ...(await this.read(db, head)), approved: head.approvedAt !== null };
  }

  /** The latest version of the document with a name; undefined where the team has none. */
  async storedNamed(db: Db, teamId: string, name: string): Promise<StoredVersion<Document> | undefined> {
    const id = await queries.findNamed(db, { teamId, kind: this.format.kind }, name);
    return id === undefined ? undefined : this.stored(db, teamId, id);
  }

  /** @throws AppError `name-taken` */
  create(db: Db, writer: Writer, draft: Draft<Document>): Promise<Version<Document>> {
    const { kind } = this.format;
    const name = this.format.nameOf(draft.document);
    return db.transaction(async (tx) => {
      const id = await queries.insertDocument(tx, { teamId: writer.teamId, kind, name });
      if (id === undefined) throw this.nameTaken(name);
      await queries.insertVersion(tx, this.row(id, 1, writer, draft));
      return this.version(tx, writer.teamId, id, 1);
    });
  }

  /** @throws AppError `version-conflict` when `basedOn` is not the latest version any more; `name-taken` */
  createVersion(
    db: Db,
    writer: Writer,
    id: string,
    { basedOn, ...draft }: Draft<Document> & { basedOn: number },
  ): Promise<Version<Document>> {
    const name = this.format.nameOf(draft.document);
    return db.transaction(async (tx) => {
      const latest = await this.find(tx, writer.teamId, id);
      if (latest.number !== basedOn) throw conflict(basedOn, latest.number, latest.createdBy);
      if (name !== latest.name) await this.rename(tx, writer.teamId, id, name);
      const number = basedOn + 1;
      if (!(await queries.insertVersion(tx, this.row(id, number, writer, draft)))) throw conflict(basedOn, number);
      return this.version(tx, writer.teamId, id, number);
    });
  }

  async approve(db: Db, approver: Writer, id: string, number: number): Promise<VersionHead> {
    await this.find(db, approver.teamId, id, number);
    await queries.insertApproval(db, { documentId: id, number, approvedBy: approver.userId });
    return headOf(await this.find(db, approver.teamId, id, number));
  }

  /** A document written between the two queries has no text yet: it is listed without. */
  private gist(text: string | undefined) {
    return text === undefined ? {} : this.format.gist(this.format.parse(JSON.parse(text)));
  }

  private async find(db: Db, teamId: string, id: string, number?: number): Promise<queries.HeadRow> {
    const row = await queries.findHead(db, { teamId, kind: this.format.kind, id }, number);
    if (row === undefined) throw notFound(`${this.format.kind}${number === undefined ? "" : " version"}`);
    return row;
  }

  private async rename(db: Db, teamId: string, id: string, name: string): Promise<void> {
    if (await queries.findNamed(db, { teamId, kind: this.format.kind, id }, name)) throw this.nameTaken(name);
    await queries.updateName(db, id, name);
  }

  private row(documentId: string, number: number, writer: Writer, { document, note }: Draft<Document>) {
    const text = this.format.write(document);
    const sha256 = createHash("sha256").update(text).digest("hex");
    return { documentId, number, text, sha256, note: note || null, createdBy: writer.userId };
  }

  private async read(db: Db, head: queries.HeadRow): Promise<{ document: Document; sha256: string }> {
    const { text, sha256 } = await queries.getText(db, head);
    return { document: this.format.parse(JSON.parse(text)), sha256 };
  }

  private nameTaken(name: string): AppError {
    return new AppError("name-taken", `Your team has a ${this.format.kind} called "${name}" already.`, {
      remedy: "Choose another name, or write a new version of that one.",
    });
  }
}

function conflict(basedOn: number, latest: number, by?: string): AppError {
  const who = by === undefined ? "" : ` by ${by}`;
  return new AppError(
    "version-conflict",
    `You started from version ${basedOn}, but version ${latest} has been written since${who}.`,
    { remedy: "Nothing of yours is lost. Compare your draft with the latest version, then save it on top of that." },
  );
}

/** Heads come in the documents' order, so those of one document stand together. */
function byDocument(heads: readonly queries.HeadRow[]): queries.HeadRow[][] {
  const groups: queries.HeadRow[][] = [];
  for (const head of heads) {
    const last = groups.at(-1);
    if (last?.[0].documentId === head.documentId) last.push(head);
    else groups.push([head]);
  }
  return groups;
}

const approvedNumbers = (versions: readonly queries.HeadRow[]): number[] =>
  versions.flatMap(({ number, approvedAt }) => (approvedAt === null ? [] : [number])).sort((a, b) => a - b);

function headOf({ number, note, createdAt, createdBy, approvedAt, approvedBy }: queries.HeadRow): VersionHead {
  return {
    number,
    createdAt: createdAt.toISOString(),
    createdBy,
    ...(note !== null && { note }),
    ...(approvedAt !== null && approvedBy !== null && { approvedBy, approvedAt: approvedAt.toISOString() }),
  };
}
