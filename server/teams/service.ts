import { hashPassword } from "#server/auth/passwords.ts";
import type { Db } from "#server/db/client.ts";
import { AppError } from "#server/http/app-error.ts";
import * as queries from "#server/teams/queries.ts";
import type { Member } from "#shared/contract/members.ts";
import type { Role } from "#shared/contract/roles.ts";

export interface MemberDraft {
  /** in lower case */
  email: string;
  name?: string;
  role: Role;
  password: string;
}

export function insertTeam(db: Db, name: string): Promise<string> {
  return queries.insertTeam(db, name);
}

export function hasTeams(db: Db): Promise<boolean> {
  return queries.hasTeams(db);
}

/** @param email in lower case */
export function findMember(db: Db, email: string): Promise<{ userId: string; teamId: string } | undefined> {
  return queries.findMember(db, email);
}

export async function listMembers(db: Db, teamId: string): Promise<Member[]> {
  return (await queries.listMembers(db, teamId)).map(memberOf);
}

/** @throws AppError `email-taken` */
export async function addMember(db: Db, teamId: string, draft: MemberDraft): Promise<Member> {
  const { password, ...person } = draft;
  const row = await queries.insertMember(db, { ...person, teamId, passwordHash: await hashPassword(password) });
  if (row === undefined) {
    throw new AppError("email-taken", `${draft.email} has an account already.`, { remedy: "Use another address." });
  }
  return memberOf(row);
}

type Row = Awaited<ReturnType<typeof queries.listMembers>>[number];

function memberOf({ name, createdAt, ...member }: Row): Member {
  return { ...member, ...(name !== null && { name }), createdAt: createdAt.toISOString() };
}
