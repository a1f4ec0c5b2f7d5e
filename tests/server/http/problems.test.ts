import express from "express";
import supertest from "supertest";
import { describe, expect, test } from "vitest";
import { AppError } from "#server/http/app-error.ts";
import { makeLog } from "#server/http/logging.ts";
import { answerProblems } from "#server/http/problems.ts";
import { Problem } from "#shared/contract/problem.ts";
import { Refusal } from "#shared/refusal.ts";

const logged: string[] = [];
const log = makeLog("error", { write: (line) => logged.push(line) });

/** An app whose only route throws. */
function throwing(error: unknown, before: (response: express.Response) => void = () => {}) {
  const app = express();
  app.get("/", (_request, response) => {
    before(response);
    throw error;
  });
  app.use(answerProblems(log));
  return supertest(app).get("/");
}

describe("a problem document", () => {
  test("of an expected failure has its status, its code, and what to do", async () => {
    const error = new AppError("version-conflict", "Version 3 is newer.", { remedy: "Compare." });
    const reply = await throwing(error).expect(409).expect("Content-Type", "application/problem+json; charset=utf-8");
    expect(Problem.strict().parse(JSON.parse(reply.text))).toEqual({
      type: "about:blank",
      title: "Somebody has written a newer version",
      status: 409,
      detail: "Version 3 is newer.",
      code: "version-conflict",
      remedy: "Compare.",
    });
  });

  test("of a refusal says where in the input, and keeps the refusal's own code", async () => {
    const error = new Refusal("unknown-channel", "No such channel.", "Name another.", { path: "zones[1].cooling" });
    const reply = await throwing(error).expect(422);
    expect(JSON.parse(reply.text)).toMatchObject({
      status: 422,
      code: "unknown-channel",
      detail: "No such channel.",
      remedy: "Name another.",
      place: { path: "zones[1].cooling" },
    });
  });

  test("of a fault of ours tells nothing of its cause but a number, under which the log tells all", async () => {
    logged.length = 0;
    const reply = await throwing(new Error("secret inner thing")).expect(500);
    const { id, code } = Problem.parse(JSON.parse(reply.text));
    expect(code).toBe("internal");
    expect(reply.text).not.toContain("secret inner thing");
    expect(logged.join("")).toContain(id);
    expect(logged.join("")).toContain("secret inner thing");
  });

  test("of what is not even an error is a fault of ours too", async () => {
    await throwing("a text").expect(500);
  });

  test("of a full disk is none of ours", async () => {
    const reply = await throwing(Object.assign(new Error("no space"), { code: "ENOSPC" })).expect(507);
    expect(JSON.parse(reply.text).code).toBe("storage-full");
  });

  test("carries no headers of the reply that was meant to be", async () => {
    const reply = await throwing(new AppError("not-ready", "Not yet."), (response) =>
      response.set({ ETag: '"x"', "Content-Disposition": "attachment" }),
    ).expect(409);
    expect(reply.headers).not.toHaveProperty("content-disposition");
    expect(reply.headers.etag).not.toBe('"x"');
  });

  test("can't follow a reply that is half out: the connection is cut", async () => {
    await expect(throwing(new Error("late"), (response) => response.write("half"))).rejects.toThrow(/aborted|hang up/);
  });
});
