import { isPassword } from "#server/auth/passwords.ts";
import * as queries from "#server/auth/queries.ts";
import type { Db } from "#server/db/client.ts";
import type { Env } from "#server/env.ts";
import type { Actor } from "#server/http/actor.ts";
import { AppError } from "#server/http/app-error.ts";

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;
/** A session's last use is written down at most this often. */
const SEEN_EVERY_MS = 60_000;

type Limits = Pick<Env, "SESSION_IDLE_HOURS" | "SESSION_MAX_DAYS">;

export interface SignedIn {
  actor: Actor;
  expiresAt: Date;
}

/**
 * Begins a session.
 *
 * @throws AppError `wrong-credentials`, which doesn't say which of the two is wrong
 */
export async function signIn(
  db: Db,
  { email, password }: { email: string; password: string },
  limits: Limits,
): Promise<SignedIn> {
  const found = await queries.findByEmail(db, email);
  if (!(await isPassword(password, found?.passwordHash)) || found === undefined) {
    throw new AppError("wrong-credentials", "There is no account with this e-mail address and password.", {
      remedy: "Check both, or ask the lead of your team for an account.",
    });
  }
  const now = new Date();
  const expiresAt = new Date(now.getTime() + limits.SESSION_MAX_DAYS * DAY_MS);
  await queries.removeDeadSessions(db, now, idleSince(now, limits));
  const sessionId = await queries.insertSession(db, { userId: found.userId, lastSeenAt: now, expiresAt });
  const { passwordHash: _, ...person } = found;
  return { actor: { ...person, sessionId }, expiresAt };
}

/** Whose session it is, if it still holds; using it keeps it from becoming idle. */
export async function findActor(db: Db, sessionId: string, limits: Limits): Promise<Actor | undefined> {
  const now = new Date();
  const session = await queries.findLiveSession(db, sessionId, now, idleSince(now, limits));
  if (session === undefined) return undefined;
  if (now.getTime() - session.lastSeenAt.getTime() > SEEN_EVERY_MS) {
    await queries.updateLastSeen(db, sessionId, now);
  }
  return session.actor;
}

/** Whether a session still holds. Unlike a request, asking is no use of it. */
export async function holds(db: Db, sessionId: string, limits: Limits): Promise<boolean> {
  const now = new Date();
  return (await queries.findLiveSession(db, sessionId, now, idleSince(now, limits))) !== undefined;
}

export function signOut(db: Db, actor: Actor): Promise<void> {
  return queries.removeSession(db, actor.sessionId);
}

export function signOutEverywhere(db: Db, actor: Actor): Promise<void> {
  return queries.removeSessionsOf(db, actor.userId);
}

function idleSince(now: Date, { SESSION_IDLE_HOURS }: Limits): Date {
  return new Date(now.getTime() - SESSION_IDLE_HOURS * HOUR_MS);
}
