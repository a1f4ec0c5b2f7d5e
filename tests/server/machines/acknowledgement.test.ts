import { beforeEach, expect, test } from "vitest";
import { SAFETY_CHECKLIST } from "#shared/contract/safety-checklist.ts";
import { sampleMachine } from "#tests/helpers/sample.ts";
import { testServer } from "#tests/helpers/server.ts";

const server = testServer();
const ALL = SAFETY_CHECKLIST.map(({ id }) => id);
let url: string;

beforeEach(async () => {
  const { body } = await server.as("engineer").post("/api/machines").send({ document: sampleMachine() }).expect(201);
  url = `/api/machines/${body.id}/versions`;
});

test("nothing is acknowledged until the whole checklist is ticked", async () => {
  const before = await server.as("operator").get(`${url}/1/acknowledgement`).expect(200);
  expect(before.body).toEqual({ checklist: [], at: null });
  const { body } = await server
    .as("operator")
    .put(`${url}/1/acknowledgement`)
    .send({ checklist: ALL.slice(2) });
  expect(body).toMatchObject({ status: 422, code: "checklist-incomplete" });
  expect(body.errors.map(({ path }: { path: string }) => path)).toEqual(
    ALL.slice(0, 2).map((id) => `body.checklist.${id}`),
  );
  const after = await server.as("operator").get(`${url}/1/acknowledgement`).expect(200);
  expect(after.body.at).toBeNull();
});

test("an acknowledgement is one person's", async () => {
  const given = await server.as("operator").put(`${url}/1/acknowledgement`).send({ checklist: ALL }).expect(200);
  expect(given.body).toEqual({ checklist: ALL, at: expect.any(String) });
  const mine = await server.as("operator").get(`${url}/1/acknowledgement`).expect(200);
  expect(mine.body).toEqual(given.body);
  const theirs = await server.as("lead").get(`${url}/1/acknowledgement`).expect(200);
  expect(theirs.body.at).toBeNull();
});

test("a new version of the machine has to be acknowledged anew", async () => {
  await server.as("operator").put(`${url}/1/acknowledgement`).send({ checklist: ALL }).expect(200);
  await server.as("engineer").post(url).send({ basedOn: 1, document: sampleMachine() }).expect(201);
  const { body } = await server.as("operator").get(`${url}/2/acknowledgement`).expect(200);
  expect(body.at).toBeNull();
});

test("a stranger may neither see nor give one", async () => {
  await server.as("operator", "birch").get(`${url}/1/acknowledgement`).expect(404);
  await server.as("operator", "birch").put(`${url}/1/acknowledgement`).send({ checklist: ALL }).expect(404);
});
