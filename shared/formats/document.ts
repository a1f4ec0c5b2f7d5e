import type { z } from "zod";
import { explainIssues } from "#shared/formats/explain.ts";
import { refuseProblems } from "#shared/formats/problems.ts";

/** What a document is called in messages and error codes. */
export type DocumentKind = "machine" | "profile" | "polymer" | "reading" | "plan" | "proof" | "prediction";

/**
 * Applies a document's schema.
 *
 * @throws Refusal `bad-<kind>` with one line for every problem; its place is the first problem's path
 */
export function parseDocument<Schema extends z.ZodType>(
  schema: Schema,
  json: unknown,
  kind: DocumentKind,
): z.output<Schema> {
  const result = schema.safeParse(json);
  if (result.success) return result.data;
  return refuseProblems(`bad-${kind}`, `The ${kind} document is not usable`, explainIssues(result.error.issues, json));
}

/** What a document says, without the number of its version: versions that say the same are equal in this. */
export function contentOf<Document extends { version?: number }>({ version: _, ...content }: Document) {
  return content;
}

/**
 * A document as JSON text with two spaces of indent, pairs of numbers on one line and a final newline. Fields come in
 * the schema's order, whatever order the object was put together in, so equal documents give equal bytes.
 */
export function writeDocument<Schema extends z.ZodType>(schema: Schema, document: z.output<Schema>): string {
  const ordered = schema.parse(document);
  // A real line break never stands inside a JSON string, so this cannot touch a name.
  const pair = /\[\n\s*(-?[\d.e+-]+),\n\s*(-?[\d.e+-]+)\n\s*\]/g;
  return `${JSON.stringify(ordered, null, 2).replace(pair, "[$1, $2]")}\n`;
}
