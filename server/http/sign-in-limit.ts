import type { RequestHandler } from "express";
import { rateLimit } from "express-rate-limit";
import { AppError } from "#server/http/app-error.ts";

const WINDOW_MINUTES = 15;

/** Refuses further sign-ins from an address after too many that failed. */
export function signInLimit(attempts: number): RequestHandler {
  return rateLimit({
    windowMs: WINDOW_MINUTES * 60_000,
    limit: attempts,
    skipSuccessfulRequests: true,
    standardHeaders: "draft-8",
    legacyHeaders: false,
    handler: (_request, _response, next) =>
      next(
        new AppError("too-many-attempts", `More than ${attempts} sign-ins from your network failed.`, {
          remedy: `Wait ${WINDOW_MINUTES} minutes, then try again.`,
          headers: { "Retry-After": String(WINDOW_MINUTES * 60) },
        }),
      ),
  });
}
