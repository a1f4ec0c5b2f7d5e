import { z } from "zod";

/** Key of a row; the same for everybody, so a link can be sent around inside a team. */
export const Id = z.uuid();
/** A moment, ISO 8601 in UTC. */
export const Instant = z.iso.datetime();
/** Number of a version: 1, 2, 3 … */
export const VersionNumber = z.int().min(1).max(1_000_000);
export const Count = z.int().min(0);
export const Sha256 = z.string().regex(/^[0-9a-f]{64}$/);
/** E-mail addresses are compared in lower case. */
export const Email = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, { error: "is longer than 254 characters" })
  .pipe(z.email({ error: "is no e-mail address. Write it as name@example.org" }));
/** Why a version was made; one paragraph. */
export const Note = z.string().trim().max(2_000, { error: "is longer than 2000 characters. Shorten it" });

/** Bytes of a stored file and the digest that names them. */
export const StoredFile = z.object({ sha256: Sha256, bytes: Count });
export type StoredFile = z.infer<typeof StoredFile>;

/** Why an input was not accepted, kept with the reading or tuning it ended. */
export const RefusalReport = z.object({
  code: z.string(),
  message: z.string(),
  remedy: z.string(),
  place: z.object({ line: z.int().optional(), layer: z.int().optional(), path: z.string().optional() }),
});
export type RefusalReport = z.infer<typeof RefusalReport>;
