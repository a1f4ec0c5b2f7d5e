/**
 * Every failure that a person can cause or should hear of, with its status and title. A reply's `code` is one of these,
 * or that of a Refusal.
 */
export const PROBLEMS = {
  "invalid-request": [422, "The request can't be used"],
  "bad-json": [400, "The request is not valid JSON"],
  "wrong-media-type": [415, "The request has the wrong media type"],
  "too-large": [413, "The request is too large"],
  "upload-incomplete": [400, "The upload is incomplete"],
  "signed-out": [401, "Not signed in"],
  "wrong-credentials": [401, "E-mail address or password is wrong"],
  "too-many-attempts": [429, "Too many attempts"],
  "cross-site": [403, "The request came from another site"],
  forbidden: [403, "Not permitted"],
  "version-not-approved": [403, "The profile version is not approved"],
  "not-found": [404, "Not found"],
  "version-conflict": [409, "Somebody has written a newer version"],
  "name-taken": [409, "The name is taken"],
  "email-taken": [409, "The e-mail address is taken"],
  "not-ready": [409, "Not ready yet"],
  "in-use": [409, "Still in use"],
  "proof-failed": [409, "The proof failed"],
  "acknowledge-first": [409, "The cautions are not acknowledged yet"],
  "checklist-incomplete": [422, "The checklist is incomplete"],
  "storage-full": [507, "The disk is full"],
  "shutting-down": [503, "The server is stopping"],
  internal: [500, "A fault of ours"],
} as const satisfies Record<string, readonly [status: number, title: string]>;

export type ProblemCode = keyof typeof PROBLEMS;

export interface ProblemDetails {
  /** what the person can do about it, one sentence */
  remedy?: string;
  errors?: { path: string; message: string }[];
  headers?: Record<string, string>;
}

/** An expected failure. Thrown anywhere on the server, answered in one place (http/problems.ts). */
export class AppError extends Error {
  override readonly name = "AppError";
  readonly code: ProblemCode;
  readonly details: ProblemDetails;

  /** @param message what is wrong, one sentence */
  constructor(code: ProblemCode, message: string, details: ProblemDetails = {}) {
    super(message);
    this.code = code;
    this.details = details;
  }
}

/** The same answer whether a thing never existed or belongs to another team. */
export function notFound(what: string): AppError {
  return new AppError("not-found", `There is no such ${what} in your team.`);
}
