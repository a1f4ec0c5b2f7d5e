import { z } from "zod";
import { nearestSpelling } from "#shared/formats/spelling.ts";

/** Control characters, line and paragraph separators, lone surrogates, and marks that reorder text on screen or paper. */
const NOT_IN_A_NAME = /[\p{Cc}\p{Zl}\p{Zp}\p{Cs}\u202a-\u202e\u2066-\u2069]/u;

const MAX_NAME_LENGTH = 120;

/**
 * A name a person gives. It ends up in a comment of the tuned file and on the run sheet, so nothing that could end the
 * line, or show something other than what is stored, is let in.
 */
export const Label = z
  .string()
  .refine((name) => name.trim() !== "", { error: "is empty. Give it a name" })
  .refine((name) => name.length <= MAX_NAME_LENGTH, {
    error: `is longer than ${MAX_NAME_LENGTH} characters. Shorten it`,
  })
  .refine((name) => !NOT_IN_A_NAME.test(name), {
    error: "contains a line break or another control character. Type it again as plain text",
  });

/**
 * Identifier of a channel, as profiles name it. `constructor` is kept out because ids are keys of plain objects, where
 * that one name is never missing.
 */
export const ChannelId = z
  .string()
  .refine((id) => /^[a-z][a-z0-9]*(-[a-z0-9]+)*$/.test(id) && id.length <= 40 && id !== "constructor", {
    error: 'is no channel id. Use up to 40 lower-case letters, digits and single hyphens, such as "part-fan"',
  });

/** Name of an output in the firmware's own configuration; it is written into a command line, hence no spaces or quotes. */
export const DriveName = z.string().refine((name) => /^[A-Za-z_][A-Za-z0-9_.-]{0,59}$/.test(name), {
  error: "cannot stand in a command. Use up to 60 letters, digits, _ . or -, starting with a letter or _",
});

const withoutMinusZero = (value: number) => value + 0;

/** Any finite number: measured values, on which rounding errors leave no exact bounds. */
export const Finite = z.number().overwrite(withoutMinusZero);

/**
 * A finite number within [min, max]; minus zero is stored as zero, since JSON does not keep it.
 *
 * @param remedy sentence without a full stop that follows the message
 */
export function numberWithin(min: number, max: number, remedy = "") {
  const error = outOfRange(`between ${min} and ${max}`, remedy);
  return z.number().min(min, { error }).max(max, { error }).overwrite(withoutMinusZero);
}

/** A finite number above 0 and up to max. */
export function positiveUpTo(max: number, remedy = "") {
  const error = outOfRange(`above 0 and at most ${max}`, remedy);
  return z.number().gt(0, { error }).max(max, { error });
}

/** A whole number within [min, max]. */
export function wholeWithin(min: number, max: number, remedy = "") {
  const error = outOfRange(`a whole number between ${min} and ${max}`, remedy);
  return z.int().min(min, { error }).max(max, { error }).overwrite(withoutMinusZero);
}

const outOfRange = (range: string, remedy: string) => (issue: { input?: unknown }) =>
  `must be ${range}, got ${issue.input}${remedy === "" ? "" : `. ${remedy}`}`;

const FRACTION = "Give the duty as a fraction of full power, such as 0.62 for 62 %";

/** Share of full power, 0-1. */
export const Duty = numberWithin(0, 1, FRACTION);

/** Share of full power, above 0. */
export const DutyAboveZero = positiveUpTo(1, FRACTION);

/** Crystallinity, emissivity and the like, 0-1. */
export const Share = numberWithin(0, 1, "Give it as a fraction, such as 0.35 for 35 %");

/** Number of the version where a team keeps versions of a document, from 1. */
export const Version = wholeWithin(1, 1_000_000_000, "Versions are numbered 1, 2, 3");

/** SHA-256 in lower-case hexadecimal. */
export const Sha256 = z.string().refine((digest) => /^[0-9a-f]{64}$/.test(digest), {
  error: "is no SHA-256 digest. Give 64 lower-case hexadecimal digits",
});

/** An object that knows these fields and no other; an unknown one is answered with the nearest spelling. */
export function fields<Shape extends z.core.$ZodLooseShape>(shape: Shape) {
  const allowed = Object.keys(shape);
  return z.strictObject(shape, {
    // One line for every unknown field, in the order of the issue's keys: explainIssues gives each its own path.
    error: (issue) =>
      issue.code === "unrecognized_keys" ? issue.keys.map((key) => unknownField(key, allowed)).join("\n") : undefined,
  });
}

function unknownField(key: string, allowed: readonly string[]): string {
  const meant = nearestSpelling(key, allowed);
  const remedy = meant === undefined ? "Remove it." : `Did you mean "${meant}"?`;
  return `is not a known field. ${remedy} The fields here are ${allowed.join(", ")}`;
}

/** An object with one entry per channel id, its keys in a stable order so that equal documents are written alike. */
export function perChannel<Value extends z.ZodType>(value: Value) {
  return z.record(ChannelId, value).overwrite(sortKeys);
}

function sortKeys<Entries extends Record<string, unknown>>(entries: Entries): Entries {
  return Object.fromEntries(
    Object.keys(entries)
      .sort()
      .map((key) => [key, entries[key]]),
  ) as Entries;
}
