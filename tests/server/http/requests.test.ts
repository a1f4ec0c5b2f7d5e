import { expect, test } from "vitest";
import { sampleMachine } from "#tests/helpers/sample.ts";
import { PASSWORD, testServer } from "#tests/helpers/server.ts";

const server = testServer();
const list = () => server.as("lead").get("/api/machines").expect(200);

test("what is not under /api in any contract is a problem document, not a page", async () => {
  const { body } = await server.as("lead").get("/api/nothing").expect(404);
  expect(body).toMatchObject({ code: "not-found", detail: "There is nothing at GET /api/nothing." });
});

test("a body that is not JSON is named as such", async () => {
  const post = () => server.as("lead").post("/api/machines");
  const broken = await post().set("Content-Type", "application/json").send("{").expect(400);
  expect(broken.body.code).toBe("bad-json");
  const text = await post().set("Content-Type", "text/plain").send("hello").expect(415);
  expect(text.body.code).toBe("wrong-media-type");
  const large = await post()
    .send({ note: "x".repeat(5_000_000) })
    .expect(413);
  expect(large.body.code).toBe("too-large");
  expect((await list()).body).toEqual([]);
});

test("a path that can't be decoded is a bad request, not a fault of ours", async () => {
  expect((await server.as("lead").get("/api/machines/%E0%A4%A").expect(400)).body.status).toBe(400);
});

test("a field that nobody knows is refused", async () => {
  const draft = { document: sampleMachine(), owner: "me" };
  const { body } = await server.as("lead").post("/api/machines").send(draft).expect(422);
  expect(body.errors[0].path).toBe("body.owner");
});

test.each([
  ["a page of another site", { "Sec-Fetch-Site": "cross-site" }, 403],
  ["a page of a neighbouring host", { "Sec-Fetch-Site": "same-site" }, 403],
  ["a page of another site in an old browser", { Origin: "https://evil.example" }, 403],
  ["a page without an origin in an old browser", { Origin: "null" }, 403],
  ["this server's page", { "Sec-Fetch-Site": "same-origin" }, 201],
  ["this server's page in an old browser", { Host: "shop.example:8080", Origin: "http://shop.example:8080" }, 201],
  ["a program that is no browser", {}, 201],
])("a write from %s", async (_, headers, status) => {
  const reply = await server.as("lead").post("/api/machines").set(headers).send({ document: sampleMachine() });
  expect(reply.status).toBe(status);
  if (status === 403) expect(reply.body.code).toBe("cross-site");
  expect((await list()).body).toHaveLength(status === 403 ? 0 : 1);
});

test("a page of another site can't sign anybody in either", async () => {
  const credentials = { email: "lead@alder.example", password: PASSWORD };
  await server.with().post("/api/session").set("Sec-Fetch-Site", "cross-site").send(credentials).expect(403);
});

test("replies may not be kept, framed, sniffed or run scripts from elsewhere", async () => {
  const { headers } = await list();
  expect(headers["cache-control"]).toBe("no-store");
  expect(headers["x-content-type-options"]).toBe("nosniff");
  expect(headers).not.toHaveProperty("x-powered-by");
  expect(headers["content-security-policy"]).toBe(
    "default-src 'self';style-src 'self' 'unsafe-inline';object-src 'none';base-uri 'none';form-action 'self';frame-ancestors 'none'",
  );
});
