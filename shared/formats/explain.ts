import type { z } from "zod";
import { pathText } from "#shared/formats/path-text.ts";
import type { Problem } from "#shared/formats/problems.ts";
import { nearestSpelling } from "#shared/formats/spelling.ts";

type Issue = z.core.$ZodIssue;

/**
 * A schema's issues in words a person can act on, each with its path in the document as it was given.
 *
 * @param document the JSON the schema was applied to: issues name a place, the words need what stood there
 */
export function explainIssues(issues: readonly Issue[], document: unknown): Problem[] {
  return issues.flatMap((issue) => {
    const { path, value } = locate(document, issue.path);
    if (issue.code === "unrecognized_keys") {
      const messages = issue.message.split("\n");
      return issue.keys.map((key, i) => ({ path: pathText([...path, key]), message: messages[i] ?? messages[0] }));
    }
    return [{ path: pathText(path), message: explain(issue, value) }];
  });
}

/** Follows a path as far as the document goes. A rule given without a list has no index in the document, so none is shown. */
function locate(document: unknown, path: readonly PropertyKey[]): { path: PropertyKey[]; value: unknown } {
  let value = document;
  const seen: PropertyKey[] = [];
  for (const key of path) {
    if (typeof key === "number" && !Array.isArray(value) && value !== undefined) continue;
    seen.push(key);
    value =
      typeof value === "object" && value !== null && Object.hasOwn(value, key) ? Reflect.get(value, key) : undefined;
  }
  return { path: seen, value };
}

function explain(issue: Issue, value: unknown): string {
  switch (issue.code) {
    case "invalid_type":
      return wrongType(issue.expected, value);
    case "invalid_value":
      return wrongChoice(issue.values, value);
    case "invalid_union":
      return "options" in issue && issue.options
        ? wrongChoice(issue.options, value)
        : withMissing(issue.message, value);
    case "invalid_key":
      return issue.issues[0].message;
    case "too_big":
      return issue.origin === "array" ? `has more than ${issue.maximum} entries. Shorten the list` : issue.message;
    default:
      return issue.message;
  }
}

const TYPE_NAMES: Record<string, string> = {
  string: "a text",
  number: "a number",
  int: "a whole number",
  boolean: "true or false",
  array: "a list",
  tuple: "a pair of numbers",
  object: "an object",
  record: "an object",
};

function wrongType(expected: string, value: unknown): string {
  const wanted = TYPE_NAMES[expected] ?? expected;
  if (value === undefined) return `is missing. Add it: ${wanted}`;
  const message = `must be ${wanted}, got ${shown(value)}`;
  if (typeof value === "string" && wanted.endsWith("number") && value.trim() !== "" && Number.isFinite(Number(value))) {
    return `${message}. Remove the quotes`;
  }
  return value === null ? `${message}. Leave an optional field out instead` : message;
}

function wrongChoice(options: readonly unknown[], value: unknown): string {
  const list = options.map(shown);
  const wanted = list.length === 1 ? list[0] : `one of ${list.join(", ")}`;
  if (value === undefined) return `is missing. Add it: ${wanted}`;
  const words = options.filter((option) => typeof option === "string");
  const meant = typeof value === "string" && words.length > 1 ? nearestSpelling(value, words) : undefined;
  const message = `must be ${wanted}, got ${shown(value)}`;
  return meant === undefined ? message : `${message}. Did you mean "${meant}"?`;
}

function withMissing(message: string, value: unknown): string {
  return value === undefined ? `is missing: it ${message}` : `${message}, got ${shown(value)}`;
}

const LONGEST_SHOWN = 40;

/** A value as it may stand in one line of text. */
function shown(value: unknown): string {
  if (Array.isArray(value)) return "a list";
  if (typeof value === "object" && value !== null) return "an object";
  if (typeof value !== "string") return String(value);
  return JSON.stringify(value.length > LONGEST_SHOWN ? `${value.slice(0, LONGEST_SHOWN)}…` : value);
}
