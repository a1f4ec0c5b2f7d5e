import { and, eq, gt, lte, or } from "drizzle-orm";
import type { Db } from "#server/db/client.ts";
import { sessions, teams, users } from "#server/db/schema/teams.ts";
import type { Actor } from "#server/http/actor.ts";

const ACTOR = {
  userId: users.id,
  email: users.email,
  name: users.name,
  role: users.role,
  teamId: users.teamId,
  teamName: teams.name,
};

/** The person with an address (in lower case), with the hash of the password. */
export async function findByEmail(db: Db, email: string) {
  const [row] = await db
    .select({ ...ACTOR, passwordHash: users.passwordHash })
    .from(users)
    .innerJoin(teams, eq(teams.id, users.teamId))
    .where(eq(users.email, email));
  return row;
}

export interface LiveSession {
  actor: Actor;
  lastSeenAt: Date;
}

/** A session that has neither reached its end nor been idle since `idleSince`, with whose it is. */
export async function findLiveSession(
  db: Db,
  sessionId: string,
  now: Date,
  idleSince: Date,
): Promise<LiveSession | undefined> {
  const [row] = await db
    .select({ ...ACTOR, sessionId: sessions.id, lastSeenAt: sessions.lastSeenAt })
    .from(sessions)
    .innerJoin(users, eq(users.id, sessions.userId))
    .innerJoin(teams, eq(teams.id, users.teamId))
    .where(and(eq(sessions.id, sessionId), gt(sessions.expiresAt, now), gt(sessions.lastSeenAt, idleSince)));
  if (row === undefined) return undefined;
  const { lastSeenAt, ...actor } = row;
  return { actor, lastSeenAt };
}

export async function insertSession(
  db: Db,
  session: { userId: string; lastSeenAt: Date; expiresAt: Date },
): Promise<string> {
  const [{ id }] = await db.insert(sessions).values(session).returning({ id: sessions.id });
  return id;
}

export async function updateLastSeen(db: Db, sessionId: string, lastSeenAt: Date): Promise<void> {
  await db.update(sessions).set({ lastSeenAt }).where(eq(sessions.id, sessionId));
}

export async function removeSession(db: Db, sessionId: string): Promise<void> {
  await db.delete(sessions).where(eq(sessions.id, sessionId));
}

export async function removeSessionsOf(db: Db, userId: string): Promise<void> {
  await db.delete(sessions).where(eq(sessions.userId, userId));
}

/** Sessions that can never be used again. */
export async function removeDeadSessions(db: Db, now: Date, idleSince: Date): Promise<void> {
  await db.delete(sessions).where(or(lte(sessions.expiresAt, now), lte(sessions.lastSeenAt, idleSince)));
}
