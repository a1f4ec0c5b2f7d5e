import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import express from "express";
import supertest from "supertest";
import { afterAll, expect, test } from "vitest";
import { clientFiles } from "#server/http/client-files.ts";
import { makeLog } from "#server/http/logging.ts";
import { answerProblems } from "#server/http/problems.ts";

const folder = mkdtempSync(join(tmpdir(), "quenchline-client-"));
afterAll(() => rmSync(folder, { recursive: true }));
const serving = (path: string) => supertest(express().use(clientFiles(path), answerProblems(makeLog("silent"))));

test("before the client is built, pages say how to build it", async () => {
  expect((await serving(folder).get("/").expect(503)).text).toContain("npm run build");
});

test("every page is the one document, files are themselves, and a missing file is missing", async () => {
  mkdirSync(join(folder, "assets"));
  writeFileSync(join(folder, "index.html"), "<title>page</title>");
  writeFileSync(join(folder, "assets", "main-1.js"), "1");
  const client = serving(folder);
  for (const path of ["/", "/toolpaths/1", "/index.html"]) {
    const reply = await client.get(path).expect(200).expect("Cache-Control", "no-cache");
    expect(reply.text).toBe("<title>page</title>");
  }
  const asset = await client.get("/assets/main-1.js").expect(200);
  expect(asset.headers["cache-control"]).toContain("immutable");
  await client.get("/assets/main-0.js").expect(404);
  await client.get("/robots.txt").expect(404);
});

test("nothing outside the folder is reached", async () => {
  for (const path of ["/../package.json", "/%2e%2e/package.json", "/assets/..%2f..%2fpackage.json"]) {
    expect((await serving(folder).get(path)).text).not.toContain('"dependencies"');
  }
});
