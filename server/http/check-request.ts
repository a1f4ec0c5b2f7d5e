import type { Request } from "express";
import type { z } from "zod";
import { AppError, notFound } from "#server/http/app-error.ts";
import { Id } from "#shared/contract/common.ts";
import type { PathParams } from "#shared/contract/endpoint.ts";
import { explainIssues } from "#shared/formats/explain.ts";

const NUMBER_PARAMS = new Set(["number", "index"]);
const MOST_ERRORS = 100;

/**
 * The values in a path. One that can't be a row's id is answered like the id of no row.
 *
 * @throws AppError `not-found`
 */
export function checkParams<Path extends string>(params: Request["params"]): PathParams<Path> {
  const entries = Object.entries(params).map(([name, value]) => {
    const text = String(value);
    if (!NUMBER_PARAMS.has(name)) {
      if (!Id.safeParse(text).success) throw notFound("thing");
      return [name, text.toLowerCase()];
    }
    if (!/^[1-9]\d{0,8}$/.test(text)) throw notFound("number");
    return [name, Number(text)];
  });
  return Object.fromEntries(entries);
}

/**
 * Applies the schema of a body or query.
 *
 * @throws AppError `invalid-request` with one entry for everything that is wrong
 */
export function checkPart<Schema extends z.ZodType>(
  schema: Schema,
  part: "body" | "query",
  value: unknown,
): z.output<Schema> {
  const result = schema.safeParse(value);
  if (result.success) return result.data;
  const problems = explainIssues(result.error.issues, value);
  const errors = problems.slice(0, MOST_ERRORS).map(({ path, message }) => ({
    path: path === "" ? part : path.startsWith("[") ? `${part}${path}` : `${part}.${path}`,
    message,
  }));
  const [first] = errors;
  const rest = problems.length === 1 ? "" : ` and ${problems.length - 1} more`;
  throw new AppError("invalid-request", `${first.path} ${first.message}${rest}.`, {
    remedy:
      problems.length === 1 ? "Correct the named place and try again." : "Correct the named places and try again.",
    errors,
  });
}
