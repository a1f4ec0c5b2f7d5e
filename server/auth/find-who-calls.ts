import type { RequestHandler } from "express";
import { findActor } from "#server/auth/service.ts";
import type { SessionCookie } from "#server/auth/session-cookie.ts";
import type { Parts } from "#server/parts.ts";

/** Finds out who makes a request; who may do what is decided by `mount`. */
export function findWhoCalls({ db, env }: Pick<Parts, "db" | "env">, cookie: SessionCookie): RequestHandler {
  return async (request, _response, next) => {
    const sessionId = await cookie.read(request, new Date());
    if (sessionId !== undefined) request.actor = await findActor(db, sessionId, env);
    next();
  };
}
