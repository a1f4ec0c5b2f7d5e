import { z } from "zod";
import { parseDocument, writeDocument } from "#shared/formats/document.ts";
import { fields, Label, Sha256, wholeWithin } from "#shared/formats/fields.ts";

const Count = wholeWithin(0, Number.MAX_SAFE_INTEGER);
const FileDigest = fields({ sha256: Sha256, bytes: Count });
const LineCount = fields({ lines: Count });
/** A document the proof was made with; the digest is of its text as written by the write function of its format. */
const DocumentDigest = fields({ name: Label, sha256: Sha256 });

/** One thing that was verified. */
export const Check = fields({ id: z.string(), passed: z.boolean(), detail: z.string() });
export type Check = z.infer<typeof Check>;

/** A proof document, `quenchline.proof/1`: what was verified of a tuned file against its original. */
export const ProofDocument = fields({
  format: z.literal("quenchline.proof/1"),
  passed: z.boolean(),
  /** the original and the tuned file */
  input: FileDigest,
  output: FileDigest,
  /** lines of the original that stand in the tuned file byte for byte, and those that do not */
  kept: LineCount,
  removed: LineCount,
  /** lines of the tuned file that are ours */
  inserted: LineCount,
  /** lines of a numbered file in which nothing but number and checksum changed */
  renumbered: LineCount,
  checks: z.array(Check),
  /** version of the engine */
  engine: z.string(),
  /** null where the files were compared without a profile */
  profile: DocumentDigest.nullable(),
  machine: DocumentDigest,
}).superRefine((proof, context) => {
  const all = proof.checks.length > 0 && proof.checks.every((check) => check.passed);
  if (!proof.passed || all) return;
  const message = "is true, but a check failed or none was made. A proof passes only when every check does";
  context.addIssue({ code: "custom", path: ["passed"], message, input: proof });
});
export type ProofDocument = z.infer<typeof ProofDocument>;

/** @throws Refusal `bad-proof` naming every problem with its path */
export function parseProof(json: unknown): ProofDocument {
  return parseDocument(ProofDocument, json, "proof");
}

/** The document as JSON text; `parseProof` reads it back unchanged. */
export function writeProof(proof: ProofDocument): string {
  return writeDocument(ProofDocument, proof);
}
