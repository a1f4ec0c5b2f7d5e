import { expect, test } from "vitest";
import { testServer } from "#tests/helpers/server.ts";

const server = testServer();
const NEW = { email: "Lab@Alder.Example", name: "Materials lab", role: "operator", password: "a long password" };

test("a member whom the lead adds can sign in, with the address in any case", async () => {
  const { body } = await server.as("lead").post("/api/members").send(NEW).expect(201);
  expect(body).toMatchObject({ email: "lab@alder.example", name: "Materials lab", role: "operator" });
  expect(body).not.toHaveProperty("passwordHash");
  const credentials = { email: "LAB@alder.example", password: NEW.password };
  const session = await server.with().post("/api/session").send(credentials).expect(200);
  expect(session.body).toMatchObject({ user: { id: body.id, role: "operator" }, team: { name: "alder" } });
});

test("the list shows one's own team only", async () => {
  const { body } = await server.as("viewer").get("/api/members").expect(200);
  expect(body.map(({ email }: { email: string }) => email).sort()).toEqual(
    ["engineer", "lead", "operator", "viewer"].map((role) => `${role}@alder.example`),
  );
});

test("an address has one account, whatever the team", async () => {
  await server.as("lead").post("/api/members").send(NEW).expect(201);
  const { body } = await server.as("lead", "birch").post("/api/members").send(NEW).expect(409);
  expect(body.code).toBe("email-taken");
});

test("a short password, a wrong address and an unknown role are named together", async () => {
  const draft = { email: "nobody", role: "owner", password: "short" };
  const { body } = await server.as("lead").post("/api/members").send(draft).expect(422);
  expect(body.errors.map(({ path }: { path: string }) => path).sort()).toEqual([
    "body.email",
    "body.password",
    "body.role",
  ]);
});
