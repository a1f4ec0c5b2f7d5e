import { Refusal } from "#shared/refusal.ts";

/** What a server answers when it can't do what was asked (RFC 9457), as far as the client uses it. */
export interface Problem {
  status: number;
  code: string;
  title: string;
  detail: string;
  remedy?: string;
  errors?: { path: string; message: string }[];
  place?: { line?: number; layer?: number; path?: string };
}

/** The one error that `call` throws. Its message is the problem's detail; status 0 means that no answer came. */
export class ProblemError extends Error {
  override readonly name = "ProblemError";
  readonly problem: Problem;

  constructor(problem: Problem) {
    super(problem.detail);
    this.problem = problem;
  }
}

const NO_ANSWER: Problem = {
  status: 0,
  code: "no-answer",
  title: "No connection",
  detail: "The server does not answer.",
  remedy: "Check the network and try again. What you have typed stays on this page.",
};

export function noAnswer(): ProblemError {
  return new ProblemError(NO_ANSWER);
}

/** Reads a problem document; a reply that is none (a proxy's error page, say) becomes one that says so. */
export function problemFrom(status: number, text: string): ProblemError {
  const said = jsonObject(text);
  const string = (key: string): string | undefined => (typeof said[key] === "string" ? said[key] : undefined);
  return new ProblemError({
    status,
    code: string("code") ?? `http-${status}`,
    title: string("title") ?? "The request failed",
    detail: string("detail") ?? `The server answered with status ${status} and no explanation.`,
    remedy:
      string("remedy") ??
      (status >= 500 ? "Try again in a moment. If it stays, tell whoever runs the server." : undefined),
    errors: Array.isArray(said.errors) ? (said.errors as Problem["errors"]) : undefined,
    place: typeof said.place === "object" && said.place !== null ? (said.place as Problem["place"]) : undefined,
  });
}

/** Anything thrown, as a problem that can be shown. */
export function asProblem(error: unknown): Problem {
  if (error instanceof ProblemError) return error.problem;
  if (error instanceof Refusal) {
    const { code, message, remedy, place } = error;
    return { status: 422, code, title: "Not accepted", detail: message, remedy, place };
  }
  return {
    status: -1,
    code: "page-fault",
    title: "Something went wrong on this page",
    detail: error instanceof Error ? error.message : String(error),
    remedy: "Load the page again. If it stays, tell whoever runs the server what you did before.",
  };
}

export function isProblem(error: unknown, code: string): error is ProblemError {
  return error instanceof ProblemError && error.problem.code === code;
}

function jsonObject(text: string): Record<string, unknown> {
  try {
    const value: unknown = JSON.parse(text);
    return typeof value === "object" && value !== null ? (value as Record<string, unknown>) : {};
  } catch {
    return {};
  }
}
