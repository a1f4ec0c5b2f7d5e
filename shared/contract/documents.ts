import { z } from "zod";
import { Id, Instant, Note, VersionNumber } from "#shared/contract/common.ts";
import { MachineGist, PolymerGist, ProfileGist } from "#shared/contract/gists.ts";

/** What is known of a version without its document. Versions are never changed or removed. */
export const VersionHead = z.object({
  number: VersionNumber,
  createdAt: Instant,
  /** e-mail address */
  createdBy: z.string(),
  note: z.string().optional(),
  /** only of profiles: who approved this version for parts that ship */
  approvedBy: z.string().optional(),
  approvedAt: Instant.optional(),
});
export type VersionHead = z.infer<typeof VersionHead>;

/** One line of a list of machines, polymers or profiles. */
export const DocumentSummary = z.object({
  id: Id,
  /** as in the latest version */
  name: z.string(),
  /** how many there are */
  versions: z.int().min(1),
  latest: VersionHead,
  /** only of profiles: numbers of the approved versions, ascending */
  approved: z.array(VersionNumber).optional(),
  /** what the latest version says, as far as lists show it; the one of its kind */
  machine: MachineGist.optional(),
  profile: ProfileGist.optional(),
  polymer: PolymerGist.optional(),
});
export type DocumentSummary = z.infer<typeof DocumentSummary>;

/** A machine, polymer or profile with its versions, the latest first. */
export const DocumentHistory = z.object({
  id: Id,
  name: z.string(),
  versions: z.array(VersionHead).min(1),
});
export type DocumentHistory = z.infer<typeof DocumentHistory>;

/** Body that makes the first version. 409 `name-taken` */
export const draftOf = <Document extends z.ZodType>(document: Document) =>
  z.strictObject({ document, note: Note.optional() });

/**
 * Body that makes the next version. `basedOn` is the version that was opened for editing; when somebody has written
 * another since, the answer is 409 `version-conflict` and nothing is stored.
 */
export const nextDraftOf = <Document extends z.ZodType>(document: Document) =>
  z.strictObject({ basedOn: VersionNumber, document, note: Note.optional() });

/** One version with its document. */
export const versionOf = <Document extends z.ZodType>(document: Document) =>
  z.object({ id: Id, ...VersionHead.shape, document });
