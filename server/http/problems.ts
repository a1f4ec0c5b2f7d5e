import type { ErrorRequestHandler, Request, Response } from "express";
import type { Logger } from "pino";
import { AppError, PROBLEMS, type ProblemCode, type ProblemDetails } from "#server/http/app-error.ts";
import { PROBLEM_TYPE, type Problem } from "#shared/contract/problem.ts";
import { Refusal } from "#shared/refusal.ts";

/** The only place that turns errors into replies. Whatever is not expected is a fault of ours, logged with an id. */
export function answerProblems(log: Logger): ErrorRequestHandler {
  return (error: unknown, request: Request, response: Response, _next) => {
    const expected = expectedError(error);
    const problem = expected === undefined ? faultOfOurs(error, request, log) : problemOf(expected);
    if (response.headersSent) {
      // Part of a file is out already: cutting the connection is the only way left to say that it is incomplete.
      response.destroy();
      return;
    }
    if (expected instanceof AppError) response.set(expected.details.headers ?? {});
    // Headers of the reply that was meant to be must not describe this one.
    for (const name of ["ETag", "Content-Disposition", "Content-Range", "Content-Length"]) response.removeHeader(name);
    response.once("finish", () => cutUnfinished(request));
    response.status(problem.status).set("Cache-Control", "no-store").type(PROBLEM_TYPE).send(JSON.stringify(problem));
  };
}

/** How long the rest of a refused body is taken, and thrown away. */
const PATIENCE_MS = 1_000;

/**
 * What is refused before its body has come is answered at once, but many clients look for an answer only when they have
 * sent everything or can't send any more. Cutting at once could cost them the answer; never cutting, the whole body.
 */
function cutUnfinished(request: Request): void {
  if (request.complete) return;
  const cut = setTimeout(() => request.socket.destroy(), PATIENCE_MS);
  request.once("close", () => clearTimeout(cut));
}

export function problemOf(error: AppError | Refusal): Problem {
  if (error instanceof Refusal) return refusalProblem(error);
  return problem(error.code, error.message, error.details);
}

function refusalProblem({ code, message, remedy, place }: Refusal): Problem {
  return { type: "about:blank", title: "The input is not accepted", status: 422, detail: message, code, remedy, place };
}

function problem(code: ProblemCode, detail: string, { remedy, errors }: ProblemDetails): Problem {
  const [status, title] = PROBLEMS[code];
  return { type: "about:blank", title, status, detail, code, ...(remedy && { remedy }), ...(errors && { errors }) };
}

function faultOfOurs(error: unknown, request: Request, log: Logger): Problem {
  const id = crypto.randomUUID();
  log.error({ err: error, problemId: id, method: request.method, path: request.path }, "a request failed");
  const detail = "The server could not do this because of a fault of its own. Nothing was changed that you can't see.";
  const remedy = `Try again. If it keeps failing, give the number ${id} to whoever runs this server.`;
  return { ...problem("internal", detail, { remedy }), id };
}

/** Errors of Express and of the system that are no faults of ours, in our own terms. */
function expectedError(error: unknown): AppError | Refusal | undefined {
  if (error instanceof AppError || error instanceof Refusal) return error;
  if (!(error instanceof Error)) return undefined;
  const { type, status, code } = error as Error & { type?: unknown; status?: unknown; code?: unknown };
  if (type === "entity.parse.failed") return new AppError("bad-json", "The body of the request is not valid JSON.");
  if (type === "entity.too.large") return new AppError("too-large", "The body of the request is too large.");
  if (type === "request.aborted") return new AppError("upload-incomplete", "The connection ended before the request.");
  if (type === "charset.unsupported" || type === "encoding.unsupported") {
    return new AppError("wrong-media-type", "The body of the request is not UTF-8 text.");
  }
  if (code === "ENOSPC" || code === "EDQUOT") {
    const remedy = "Ask whoever runs this server to make room.";
    return new AppError("storage-full", "The server's disk is full, so nothing was stored.", { remedy });
  }
  // Express answers a path that can't be decoded like this.
  if (error instanceof URIError || status === 400) return new AppError("bad-json", "The request can't be understood.");
  return undefined;
}
