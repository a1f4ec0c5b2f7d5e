import { expect, test } from "vitest";
import { sampleProfile } from "#tests/helpers/sample.ts";
import { testServer } from "#tests/helpers/server.ts";

const server = testServer();

async function profileWithTwoVersions(): Promise<string> {
  const { body } = await server.as("engineer").post("/api/profiles").send({ document: sampleProfile() }).expect(201);
  const second = { basedOn: 1, document: sampleProfile() };
  await server.as("engineer").post(`/api/profiles/${body.id}/versions`).send(second).expect(201);
  return body.id;
}

test("the lead approves one version, which the list and the history then say", async () => {
  const id = await profileWithTwoVersions();
  const { body } = await server.as("lead").post(`/api/profiles/${id}/versions/1/approval`).expect(200);
  expect(body).toMatchObject({ number: 1, approvedBy: "lead@alder.example" });
  const list = await server.as("viewer").get("/api/profiles").expect(200);
  expect(list.body[0].approved).toEqual([1]);
  const history = await server.as("viewer").get(`/api/profiles/${id}`).expect(200);
  expect(history.body.versions[0]).not.toHaveProperty("approvedBy");
  expect(history.body.versions[1].approvedAt).toBe(body.approvedAt);
});

test("approving again changes nothing", async () => {
  const id = await profileWithTwoVersions();
  const first = await server.as("lead").post(`/api/profiles/${id}/versions/2/approval`).expect(200);
  const again = await server.as("lead").post(`/api/profiles/${id}/versions/2/approval`).expect(200);
  expect(again.body).toEqual(first.body);
});

test("a version that is not there, or another team's, can't be approved", async () => {
  const id = await profileWithTwoVersions();
  await server.as("lead").post(`/api/profiles/${id}/versions/3/approval`).expect(404);
  await server.as("lead", "birch").post(`/api/profiles/${id}/versions/1/approval`).expect(404);
  const list = await server.as("viewer").get("/api/profiles").expect(200);
  expect(list.body[0].approved).toEqual([]);
});
