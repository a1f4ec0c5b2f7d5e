import { Refusal } from "#shared/refusal.ts";

/** One thing wrong with a document. */
export interface Problem {
  /** where in the document, e.g. `zones[1].cooling.points[0]`; empty for the document as a whole */
  path: string;
  /** predicate and remedy, e.g. `must be between 0 and 1, got 1.4. Give the duty as a fraction` */
  message: string;
}

/** More lines than this help nobody; the rest is counted. */
const MOST_LINES = 30;

/**
 * Refuses a document for all of its problems at once.
 *
 * @param code stable identifier of the refusal
 * @param headline what is wrong as a whole, without a full stop
 * @param problems at least one, in the order of the document
 */
export function refuseProblems(code: string, headline: string, problems: readonly Problem[]): never {
  const lines = problems.slice(0, MOST_LINES).map(problemLine);
  if (problems.length > MOST_LINES) lines.push(`and ${problems.length - MOST_LINES} more`);
  const remedy =
    problems.length === 1 ? "Correct the named place and try again." : "Correct the named places and try again.";
  throw new Refusal(code, `${headline}:\n${lines.join("\n")}`, remedy, { path: problems[0].path });
}

function problemLine({ path, message }: Problem): string {
  return `${path === "" ? "the document" : path}: ${message}${/[.?]$/.test(message) ? "" : "."}`;
}
