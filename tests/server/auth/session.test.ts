import { eq } from "drizzle-orm";
import { expect, test } from "vitest";
import { SESSION_COOKIE, SessionCookie } from "#server/auth/session-cookie.ts";
import { sessions } from "#server/db/schema/teams.ts";
import { PASSWORD, testServer } from "#tests/helpers/server.ts";

const server = testServer({ SESSION_IDLE_HOURS: "2", SESSION_MAX_DAYS: "3" });
const HOUR_MS = 3_600_000;

const signIn = (email = "operator@alder.example", password = PASSWORD) =>
  server.with().post("/api/session").send({ email, password });

async function freshCookie(): Promise<string> {
  const reply = await signIn().expect(200);
  return reply.get("Set-Cookie")![0];
}
const pairOf = (setCookie: string): string => setCookie.split(";")[0];
const sessionWith = (cookie: string) => server.with(cookie).get("/api/session");

/** Moves times of all sessions of the operator. */
async function changeSessions(change: Partial<typeof sessions.$inferInsert>): Promise<void> {
  await server.parts.db
    .update(sessions)
    .set(change)
    .where(eq(sessions.userId, server.person("operator").userId));
}

test("signing in answers who and which team, and sets a cookie that scripts and other sites can't use", async () => {
  const reply = await signIn().expect(200);
  expect(reply.body).toEqual({
    user: { id: server.person("operator").userId, email: "operator@alder.example", role: "operator" },
    team: { id: server.person("operator").teamId, name: "alder" },
  });
  const [cookie] = reply.get("Set-Cookie")!;
  expect(cookie).toMatch(/; Path=\/;.*HttpOnly; SameSite=Lax$/);
  expect(cookie).not.toContain("Secure");
  expect((await sessionWith(pairOf(cookie)).expect(200)).body).toEqual(reply.body);
});

test("a wrong password and an unknown address get the same answer", async () => {
  const wrong = await signIn("operator@alder.example", "wrong").expect(401);
  const unknown = await signIn("nobody@alder.example").expect(401);
  expect(wrong.body).toEqual(unknown.body);
  expect(wrong.body.code).toBe("wrong-credentials");
  expect(wrong.get("Set-Cookie")).toBeUndefined();
});

test("signing out ends this session on the server, so a kept copy of the cookie is worth nothing", async () => {
  const cookie = pairOf(await freshCookie());
  await server.with(cookie).delete("/api/session").expect(204);
  expect((await sessionWith(cookie).expect(401)).body.code).toBe("signed-out");
});

test("signing out when signed out already is no error", async () => {
  await server.with().delete("/api/session").expect(204);
});

test("signing out everywhere ends all of one's sessions and nobody else's", async () => {
  const here = pairOf(await freshCookie());
  const there = pairOf(await freshCookie());
  await server.with(here).delete("/api/sessions").expect(204);
  await sessionWith(here).expect(401);
  await sessionWith(there).expect(401);
  await sessionWith(server.person("lead").cookie).expect(200);
});

test("signing in over an open session ends that one", async () => {
  const before = pairOf(await freshCookie());
  await server.with(before).post("/api/session").send({ email: "lead@alder.example", password: PASSWORD }).expect(200);
  await sessionWith(before).expect(401);
});

test("a session that is not used for the idle time ends, one that is used does not", async () => {
  const cookie = pairOf(await freshCookie());
  await changeSessions({ lastSeenAt: new Date(Date.now() - 1.9 * HOUR_MS) });
  await sessionWith(cookie).expect(200);
  const rows = await server.parts.db
    .select()
    .from(sessions)
    .where(eq(sessions.userId, server.person("operator").userId));
  const lastUse = Math.max(...rows.map(({ lastSeenAt }) => lastSeenAt.getTime()));
  expect(Date.now() - lastUse).toBeLessThan(60_000);
  await changeSessions({ lastSeenAt: new Date(Date.now() - 2.1 * HOUR_MS) });
  await sessionWith(cookie).expect(401);
});

test("a session ends after its longest time, however much it is used", async () => {
  const setCookie = await freshCookie();
  const expires = new Date(/Expires=([^;]+)/.exec(setCookie)![1]).getTime();
  expect(Math.abs(expires - Date.now() - 72 * HOUR_MS)).toBeLessThan(60_000);
  await changeSessions({ expiresAt: new Date(Date.now() - 1) });
  await sessionWith(pairOf(setCookie)).expect(401);
});

test("a cookie that was changed, signed by another server or unsigned is no session", async () => {
  const cookie = pairOf(await freshCookie());
  const [header, payload, signature] = cookie.slice(SESSION_COOKIE.length + 1).split(".");
  const sessionId = JSON.parse(Buffer.from(payload, "base64url").toString()).sub;
  const inAnHour = new Date(Date.now() + HOUR_MS);
  const forged = await new SessionCookie("another secret of enough length ...").sign(sessionId, inAnHour);
  const expired = await new SessionCookie(server.parts.sessionSecret).sign(sessionId, new Date(Date.now() - HOUR_MS));
  const none = Buffer.from('{"alg":"none"}').toString("base64url");
  const other = Buffer.from(JSON.stringify({ sub: sessionId, iss: "quenchline" })).toString("base64url");
  const tokens = [
    `${header}.${other}.${signature}`,
    `${header}.${payload}.${signature.slice(1)}`,
    `${none}.${payload}.`,
    forged,
    expired,
    "nonsense",
    "",
  ];
  for (const token of tokens) await sessionWith(`${SESSION_COOKIE}=${token}`).expect(401);
  await sessionWith(`other=1; ${cookie}`).expect(200);
});

test("no answer and no log line holds a password or a session", async () => {
  const cookie = await freshCookie();
  await sessionWith(pairOf(cookie)).expect(200);
  const log = server.logged.join("");
  expect(log).toContain("/api/session");
  expect(log).not.toContain(PASSWORD);
  expect(log).not.toContain(pairOf(cookie).split("=")[1]);
});
