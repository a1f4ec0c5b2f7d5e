import { asc, eq } from "drizzle-orm";
import type { Db } from "#server/db/client.ts";
import { teams, users } from "#server/db/schema/teams.ts";

export async function insertTeam(db: Db, name: string): Promise<string> {
  const [{ id }] = await db.insert(teams).values({ name }).returning({ id: teams.id });
  return id;
}

export async function hasTeams(db: Db): Promise<boolean> {
  return (await db.select({ id: teams.id }).from(teams).limit(1)).length > 0;
}

export async function findMember(db: Db, email: string): Promise<{ userId: string; teamId: string } | undefined> {
  const [row] = await db.select({ userId: users.id, teamId: users.teamId }).from(users).where(eq(users.email, email));
  return row;
}

const MEMBER = { id: users.id, email: users.email, name: users.name, role: users.role, createdAt: users.createdAt };

export function listMembers(db: Db, teamId: string) {
  return db.select(MEMBER).from(users).where(eq(users.teamId, teamId)).orderBy(asc(users.createdAt), asc(users.email));
}

/** Undefined when somebody, in whatever team, has the address already. */
export async function insertMember(db: Db, member: Omit<typeof users.$inferInsert, "id" | "createdAt">) {
  const [row] = await db.insert(users).values(member).onConflictDoNothing({ target: users.email }).returning(MEMBER);
  return row;
}
