import { expect, test } from "vitest";
import { PASSWORD, testServer } from "#tests/helpers/server.ts";

const server = testServer({ SIGN_IN_ATTEMPTS: "3" });
const signIn = (password: string) => server.with().post("/api/session").send({ email: "lead@alder.example", password });

test("after too many failed sign-ins even the right password has to wait; those that succeed don't count", async () => {
  for (let i = 0; i < 5; i++) await signIn(PASSWORD).expect(200);
  for (let i = 0; i < 3; i++) await signIn("wrong").expect(401);
  const reply = await signIn(PASSWORD).expect(429);
  expect(reply.body).toMatchObject({ code: "too-many-attempts", status: 429 });
  expect(Number(reply.get("Retry-After"))).toBeGreaterThan(0);
  await server.as("lead").get("/api/session").expect(200);
});
