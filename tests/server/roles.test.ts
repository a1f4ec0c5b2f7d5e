import { readdirSync } from "node:fs";
import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { afterAll, beforeAll, expect, test } from "vitest";
import { apiRouters } from "#server/api.ts";
import { SessionCookie } from "#server/auth/session-cookie.ts";
import { mountedOn } from "#server/http/mount.ts";
import { ROOT } from "#server/root.ts";
import { type Endpoint, pathOf } from "#shared/contract/endpoint.ts";
import { may, Role } from "#shared/contract/roles.ts";
import { testServer } from "#tests/helpers/server.ts";

const server = testServer();
const CONTRACT = join(ROOT, "shared", "contract");
const contract: object[] = await Promise.all(
  readdirSync(CONTRACT).map((name) => import(pathToFileURL(join(CONTRACT, name)).href)),
);
const isEndpoint = (value: unknown): value is Endpoint =>
  typeof value === "object" && value !== null && "allows" in value && "path" in value && "method" in value;
const endpoints = contract.flatMap((module) => Object.values(module).filter(isEndpoint));
const nameOf = ({ method, path }: Endpoint): string => `${method} ${path}`;

let http: Server;
beforeAll(
  () =>
    new Promise<void>((resolve) => {
      http = createServer((request, response) => server.app(request, response)).listen(0, "127.0.0.1", resolve);
    }),
);
afterAll(() => new Promise((resolve) => http.close(resolve)));

/** Status of a request with ids of nothing and an empty body: enough to see who is let through. */
async function statusFor({ method, path }: Endpoint, cookie?: string): Promise<number> {
  const ids = { id: crypto.randomUUID(), number: 1, index: 1 };
  const url = `http://127.0.0.1:${(http.address() as AddressInfo).port}${pathOf(path as string, ids as never)}`;
  const ended = new AbortController();
  const body = method === "GET" ? undefined : "{}";
  const headers = { "Content-Type": "application/json", ...(cookie && { Cookie: cookie }) };
  const { status } = await fetch(url, { method, body, headers, signal: ended.signal });
  // A stream of events would never end.
  ended.abort();
  return status;
}

test("the server answers every endpoint of the contract, and no other", () => {
  const cookie = new SessionCookie(server.parts.sessionSecret);
  const mounted = apiRouters(server.parts, cookie).flatMap((router) => mountedOn(router).map(nameOf));
  expect(mounted.sort()).toEqual(endpoints.map(nameOf).sort());
});

test.each(endpoints.map((endpoint) => [nameOf(endpoint), endpoint] as const))("%s", async (_, endpoint) => {
  const { allows } = endpoint;
  expect(allows === "anyone" ? [204, 422] : [401], "signed out").toContain(await statusFor(endpoint));
  for (const role of Role.options) {
    const status = await statusFor(endpoint, server.person(role).cookie);
    if (allows !== "anyone" && !may(role, allows)) expect(status, role).toBe(403);
    else expect([200, 204, 400, 404, 415, 422], role).toContain(status);
  }
});

test("each role may do all that those before it may, and the lead everything", () => {
  const permissions = [...new Set(endpoints.map(({ allows }) => allows))].filter((allows) => allows !== "anyone");
  expect(permissions.sort()).toEqual(["approve", "edit", "manage-members", "operate", "read"]);
  const counts = Role.options.map((role) => permissions.filter((permission) => may(role, permission)).length);
  expect(counts).toEqual([1, 2, 3, 5]);
});

test("a role that may not is told whom to ask", async () => {
  const { body } = await server.as("viewer").post("/api/machines").send({}).expect(403);
  expect(body).toMatchObject({ code: "forbidden", remedy: "Ask somebody with the role engineer or lead." });
});
