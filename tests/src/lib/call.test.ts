import { expect, test } from "vitest";
import { addMember, listMembers } from "#shared/contract/members.ts";
import { signIn } from "#shared/contract/session.ts";
import { getReadingDocument } from "#shared/contract/toolpaths.ts";
import { call, urlOf } from "#src/lib/call.ts";
import { ProblemError } from "#src/lib/problem.ts";
import { settleSignIn } from "#src/lib/sign-in-gate.ts";
import { fakeServer, problem } from "#tests/src/fake-server.ts";

const failure = async (work: Promise<unknown>): Promise<ProblemError["problem"]> => {
  const error = await work.then(
    () => undefined,
    (reason: unknown) => reason,
  );
  if (!(error instanceof ProblemError)) throw new Error(`expected a problem, got ${String(error)}`);
  return error.problem;
};

test("a problem document comes through whole", async () => {
  const errors = [{ path: "body.email", message: "is no e-mail address" }];
  fakeServer({
    "GET /api/members": () => problem(422, "bad-request", { errors, remedy: "Mend it.", place: { line: 3 } }),
  });
  expect(await failure(call(listMembers))).toMatchObject({
    status: 422,
    code: "bad-request",
    remedy: "Mend it.",
    errors,
    place: { line: 3 },
  });
});

test("a reply that is no problem document says so in words", async () => {
  fakeServer({ "GET /api/members": () => new Response("<html>Bad gateway</html>", { status: 502 }) });
  expect(await failure(call(listMembers))).toMatchObject({
    status: 502,
    code: "http-502",
    detail: expect.stringContaining("502"),
  });
});

test("no answer is told apart from a refusal", async () => {
  fakeServer({
    "GET /api/members": () => {
      throw new TypeError("fetch failed");
    },
  });
  expect(await failure(call(listMembers))).toMatchObject({ status: 0, code: "no-answer" });
});

test("a request that is turned away as signed out waits for the sign-in and is then sent once more, body and all", async () => {
  let signedIn = false;
  const bodies: unknown[] = [];
  fakeServer({
    "POST /api/members": ({ body }) => {
      bodies.push(body);
      return signedIn ? { id: "new" } : problem(401, "signed-out");
    },
  });
  const member = { email: "new@alderbay.example", role: "viewer" as const, password: "long enough" };
  const reply = call(addMember, { body: member });
  await expect.poll(() => bodies.length).toBe(1);
  signedIn = true;
  settleSignIn(true);
  expect(await reply).toEqual({ id: "new" });
  expect(bodies).toEqual([member, member]);
});

test("when the person does not sign in again, the request fails as signed out", async () => {
  const { seen } = fakeServer({ "GET /api/members": () => problem(401, "signed-out") });
  const reply = failure(call(listMembers));
  await expect.poll(() => seen.length).toBe(1);
  settleSignIn(false);
  expect(await reply).toMatchObject({ status: 401 });
  expect(seen).toHaveLength(1);
});

test("a wrong password is an answer, not an ended session", async () => {
  fakeServer({ "POST /api/session": () => problem(401, "wrong-credentials") });
  const body = { email: "lead@alderbay.example", password: "wrong" };
  expect(await failure(call(signIn, { body }))).toMatchObject({ code: "wrong-credentials" });
});

test("parameters are filled into the path and can't leave their segment", () => {
  expect(urlOf(getReadingDocument, { id: "a/../b" })).toBe("/api/readings/a%2F..%2Fb/document");
});
