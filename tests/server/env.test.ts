import { isAbsolute } from "node:path";
import { expect, test } from "vitest";
import { BadEnvironment, readEnv } from "#server/env.ts";

test("without any variable there is a default for everything that needs one", () => {
  const env = readEnv({ UNRELATED: "x", PORT: "" });
  expect(env).toMatchObject({ HOST: "127.0.0.1", PORT: 8080, LOG_LEVEL: "info", SEED_DEMO: true });
  expect(isAbsolute(env.DATA_DIR)).toBe(true);
});

test("all variables that can't be used are named at once", () => {
  const bad = {
    PORT: "http",
    LOG_LEVEL: "loud",
    SESSION_SECRET: "short",
    WORKERS: "0",
    SEED_DEMO: "1",
    TRUST_PROXY: "",
  };
  expect(() => readEnv(bad)).toThrow(BadEnvironment);
  let message = "";
  try {
    readEnv(bad);
  } catch (error) {
    message = (error as Error).message;
  }
  expect(message.split("\n").slice(1).sort()).toEqual([
    "LOG_LEVEL must be trace, debug, info, warn, error or silent",
    "PORT must be a whole number from 0 to 65535",
    "SEED_DEMO must be yes or no",
    "SESSION_SECRET must have at least 32 characters",
    "WORKERS must be a whole number from 1 to 64",
  ]);
});
