import { spawnSync } from "node:child_process";
import { cpSync, mkdtempSync, readdirSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, relative } from "node:path";
import { expect, test } from "vitest";
import { ROOT } from "#server/root.ts";

const MIGRATIONS = join(ROOT, "server/db/migrations");

test("the migrations lead to the schema as it is in the source", () => {
  const folder = mkdtempSync(join(tmpdir(), "quenchline-migrations-"));
  try {
    cpSync(MIGRATIONS, folder, { recursive: true });
    const tool = join(ROOT, "node_modules/drizzle-kit/bin.cjs");
    const argv = [
      "generate",
      "--dialect",
      "postgresql",
      "--schema",
      "./server/db/schema/*.ts",
      "--out",
      relative(ROOT, folder),
    ];
    const { stdout, status } = spawnSync(process.execPath, [tool, ...argv], { cwd: ROOT, encoding: "utf8" });
    // Paths are relative to the project for this tool. It ends with 0 even when it has a question that nobody answers, so what it says counts.
    expect(stdout).toContain("No schema changes, nothing to migrate");
    expect(status).toBe(0);
    expect(readdirSync(folder)).toEqual(readdirSync(MIGRATIONS));
  } finally {
    rmSync(folder, { recursive: true });
  }
});
