import { mkdtempSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, expect, test } from "vitest";
import { keptSecret } from "#server/kept-secret.ts";

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "quenchline-secret-"));
});
afterEach(() => rmSync(folder, { recursive: true }));
const modeOf = (path: string): string => (statSync(path).mode & 0o777).toString(8);

test("a secret is made once, is long, and only its owner can read it", async () => {
  const dataDir = join(folder, "data");
  const secret = await keptSecret(dataDir, "session-secret", 48);
  expect(secret).toMatch(/^[\w-]{64}$/);
  expect(await keptSecret(dataDir, "session-secret", 48)).toBe(secret);
  expect(modeOf(join(dataDir, "session-secret"))).toBe("600");
  expect(modeOf(dataDir)).toBe("700");
});

test("each data folder has its own", async () => {
  const one = await keptSecret(join(folder, "one"), "session-secret", 48);
  expect(await keptSecret(join(folder, "two"), "session-secret", 48)).not.toBe(one);
});

test("a secret that others could read is closed to them, an empty one is an error", async () => {
  const path = join(folder, "session-secret");
  writeFileSync(path, "kept\n", { mode: 0o644 });
  expect(await keptSecret(folder, "session-secret", 48)).toBe("kept");
  expect(modeOf(path)).toBe("600");
  writeFileSync(path, "");
  await expect(keptSecret(folder, "session-secret", 48)).rejects.toThrow("is empty");
});
