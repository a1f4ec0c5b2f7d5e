import { type ChildProcess, spawn } from "node:child_process";
import { once } from "node:events";
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, expect, test } from "vitest";
import { AlreadyOpen, takeLock } from "#server/db/lock.ts";

const LOCK_MODULE = join(import.meta.dirname, "../../../server/db/lock.ts");
let folder: string;
let path: string;
const children: ChildProcess[] = [];
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "quenchline-lock-"));
  path = join(folder, "database.lock");
});
afterEach(() => {
  for (const child of children.splice(0)) child.kill("SIGKILL");
  rmSync(folder, { recursive: true });
});

/** Another process that tries to take the lock, says how it went, and lives on. */
async function otherProcess(): Promise<{ child: ChildProcess; said: string }> {
  const program = `import { takeLock } from ${JSON.stringify(LOCK_MODULE)};
    try { takeLock(${JSON.stringify(path)}); console.log("taken"); } catch (error) { console.log(error.name); }
    setInterval(() => {}, 1000);`;
  const child = spawn(process.execPath, ["--import", "tsx", "--input-type=module", "-e", program], {
    stdio: ["ignore", "pipe", "inherit"],
  });
  children.push(child);
  const [said] = await once(child.stdout!, "data");
  return { child, said: String(said).trim() };
}

test("a second process is refused while the first one lives, and let in once it has let go", async () => {
  const lock = takeLock(path);
  expect((await otherProcess()).said).toBe("AlreadyOpen");
  expect(() => takeLock(path)).toThrow(AlreadyOpen);
  expect(() => takeLock(path)).toThrow(String(process.pid));
  lock.release();
  expect((await otherProcess()).said).toBe("taken");
});

test("the lock of a process that was killed is taken over", async () => {
  const { child, said } = await otherProcess();
  expect(said).toBe("taken");
  expect(() => takeLock(path)).toThrow(AlreadyOpen);
  child.kill("SIGKILL");
  await once(child, "exit");
  expect(existsSync(path)).toBe(true);
  takeLock(path).release();
  expect(readdirSync(folder)).toEqual([]);
});

test.runIf(process.platform === "linux")(
  "a process that was given the number of a dead one doesn't hold its lock",
  () => {
    takeLock(path);
    const owner = JSON.parse(readFileSync(path, "utf8"));
    writeFileSync(path, JSON.stringify({ ...owner, began: "another boot 1" }));
    takeLock(path).release();
  },
);

test("a lock that can't be read, as after a power cut, is taken over", () => {
  writeFileSync(path, "");
  takeLock(path).release();
});

test("letting go leaves a lock alone that somebody else has taken over", () => {
  const lock = takeLock(path);
  writeFileSync(path, '{"pid":1,"began":null}');
  lock.release();
  expect(existsSync(path)).toBe(true);
});
