import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Express } from "express";
import supertest from "supertest";
import { afterAll, beforeAll, beforeEach } from "vitest";
import { buildApp } from "#server/app.ts";
import { hashPassword } from "#server/auth/passwords.ts";
import { SESSION_COOKIE, SessionCookie } from "#server/auth/session-cookie.ts";
import { sessions, teams, users } from "#server/db/schema/teams.ts";
import { readEnv } from "#server/env.ts";
import { makeLog } from "#server/http/logging.ts";
import { makeParts } from "#server/make-parts.ts";
import type { Parts } from "#server/parts.ts";
import { Role } from "#shared/contract/roles.ts";
import { openTestDatabase, type TestDatabase } from "./database.ts";

type Agent = ReturnType<typeof supertest.agent>;

export const PASSWORD = "correct horse battery";
export const TEAMS = ["alder", "birch"] as const;
export type TeamName = (typeof TEAMS)[number];

const EXPIRES_AT = new Date(Date.now() + 86_400_000);

/** Somebody in a test, signed in. */
export interface Person {
  userId: string;
  sessionId: string;
  team: TeamName;
  teamId: string;
  email: string;
  role: Role;
  cookie: string;
}

/** A server for a test file: its database is emptied, and two teams with one person of each role made, before each test. */
export class TestServer {
  parts!: Parts;
  app!: Express;
  private database!: TestDatabase;
  private dataDir!: string;
  private readonly people = new Map<string, Person>();
  private passwordHash!: string;
  private readonly closing = new AbortController();
  /** what the server wrote to its log */
  readonly logged: string[] = [];

  async open(variables: Record<string, string>): Promise<void> {
    this.dataDir = await mkdtemp(join(tmpdir(), "quenchline-server-"));
    this.database = await openTestDatabase();
    this.passwordHash = await hashPassword(PASSWORD);
    const env = readEnv({
      SIGN_IN_ATTEMPTS: "1000",
      SESSION_SECRET: "s".repeat(40),
      ...variables,
      DATA_DIR: this.dataDir,
    });
    const log = makeLog("debug", { write: (line) => this.logged.push(line) });
    this.parts = await makeParts({ env, log, db: this.database.db, closing: this.closing.signal });
    this.app = buildApp(this.parts);
    for (const team of TEAMS) {
      const teamId = crypto.randomUUID();
      for (const role of Role.options) await this.invent(team, teamId, role);
    }
  }

  async reset(): Promise<void> {
    const { db } = this.parts;
    await this.database.clear();
    this.logged.length = 0;
    const people = [...this.people.values()];
    const { passwordHash } = this;
    const ids = new Map(people.map(({ teamId, team }) => [teamId, team]));
    await db.insert(teams).values([...ids].map(([id, name]) => ({ id, name })));
    await db.insert(users).values(people.map(({ userId: id, ...person }) => ({ ...person, id, passwordHash })));
    const times = { lastSeenAt: new Date(), expiresAt: EXPIRES_AT };
    await db.insert(sessions).values(people.map(({ sessionId: id, userId }) => ({ id, userId, ...times })));
  }

  async close(): Promise<void> {
    this.closing.abort();
    await this.parts.workshop.close();
    await rm(this.dataDir, { recursive: true, force: true });
  }

  person(role: Role, team: TeamName = "alder"): Person {
    return this.people.get(`${role}@${team}.example`)!;
  }

  /** Requests by the person with a role. */
  as(role: Role, team: TeamName = "alder"): Agent {
    return this.with(this.person(role, team).cookie);
  }

  /** Requests with a cookie; without one, signed out. */
  with(cookie?: string): Agent {
    const agent = supertest.agent(this.app);
    return cookie === undefined ? agent : agent.set("Cookie", cookie);
  }

  /** Everybody keeps ids and cookie through the file: only the rows are made anew. */
  private async invent(team: TeamName, teamId: string, role: Role): Promise<void> {
    const sessionId = crypto.randomUUID();
    const token = await new SessionCookie(this.parts.sessionSecret).sign(sessionId, EXPIRES_AT);
    const cookie = `${SESSION_COOKIE}=${token}`;
    const email = `${role}@${team}.example`;
    this.people.set(email, { userId: crypto.randomUUID(), sessionId, team, teamId, email, role, cookie });
  }
}

/** Opens a server for all tests of the file that calls it. */
export function testServer(variables: Record<string, string> = {}): TestServer {
  const server = new TestServer();
  beforeAll(() => server.open(variables));
  beforeEach(() => server.reset());
  afterAll(() => server.close());
  return server;
}
