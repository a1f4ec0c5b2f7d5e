import { Router } from "express";
import * as service from "#server/auth/service.ts";
import type { SessionCookie } from "#server/auth/session-cookie.ts";
import type { Actor } from "#server/http/actor.ts";
import { mount } from "#server/http/mount.ts";
import { signInLimit } from "#server/http/sign-in-limit.ts";
import type { Parts } from "#server/parts.ts";
import { getSession, type Session, signIn, signOut, signOutEverywhere } from "#shared/contract/session.ts";

export function sessionRoutes({ db, env }: Pick<Parts, "db" | "env">, cookie: SessionCookie): Router {
  const router = Router();
  router.post(signIn.path, signInLimit(env.SIGN_IN_ATTEMPTS));
  mount(router, signIn, async ({ body, actor: before, response }) => {
    const { actor, expiresAt } = await service.signIn(db, body, env);
    // Whoever signs in over a session that was open ends it; nobody is left signed in unseen.
    if (before) await service.signOut(db, before);
    await cookie.set(response, actor.sessionId, expiresAt);
    return sessionOf(actor);
  });
  mount(router, getSession, ({ actor }) => sessionOf(actor));
  mount(router, signOut, async ({ actor, response }) => {
    if (actor) await service.signOut(db, actor);
    cookie.clear(response);
  });
  mount(router, signOutEverywhere, async ({ actor, response }) => {
    await service.signOutEverywhere(db, actor);
    cookie.clear(response);
  });
  return router;
}

function sessionOf({ userId, email, name, role, teamId, teamName }: Actor): Session {
  return { user: { id: userId, email, ...(name !== null && { name }), role }, team: { id: teamId, name: teamName } };
}
