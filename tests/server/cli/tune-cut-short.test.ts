import type { ChildProcess } from "node:child_process";
import { closeSync, existsSync, openSync, readFileSync, writeFileSync, writeSync } from "node:fs";
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { beforeAll, describe, expect, test } from "vitest";
import { parseProof } from "#shared/formats/proof.ts";
import {
  expectSame,
  LAUNCH,
  listFolder,
  outcome,
  quenchline,
  SEAL_RING,
  SEAL_RING_PROFILE,
  scratchFolder,
  smallPart,
  start,
  TERN,
} from "#tests/server/cli/command-line.ts";

const DOCUMENTS = ["--machine", TERN, "--profile", SEAL_RING_PROFILE];
const PART = /^\.tuned\.gcode\.quenchline-(\d+)-[0-9a-f]{12}\.part$/;

/** Some 30 MB: long enough to be cut short while it is being written or proved. */
let longPart: string;
beforeAll(() => {
  longPart = smallPart({ layers: 60, sides: 16_000 });
});

/** A folder with the long part, and a run that has begun to write its tuned file there. */
async function runThatWrites({
  program = [process.execPath, LAUNCH],
  more = [] as string[],
} = {}): Promise<{ folder: string; child: ChildProcess }> {
  const folder = scratchFolder();
  writeFileSync(join(folder, "part.gcode"), longPart);
  writeFileSync(join(folder, "tuned.gcode"), "what stood there before");
  const [part, out] = ["part.gcode", "tuned.gcode"].map((name) => join(folder, name));
  const child = start(program[0], [...program.slice(1), "tune", part, ...DOCUMENTS, "--out", out, ...more]);
  while (!listFolder(folder).some((name) => PART.test(name))) {
    if (child.exitCode !== null) throw new Error("it ended before it could be cut short");
    await wait(2);
  }
  return { folder, child };
}

const standing = (folder: string) => readFileSync(join(folder, "tuned.gcode"), "utf8");

describe("whoever stops a run finds OUT as it was before", () => {
  test.each(["SIGINT", "SIGTERM", "SIGHUP"] as const)("%s leaves no temporary file", async (signal) => {
    const { folder, child } = await runThatWrites();
    const ended = outcome(child);
    child.kill(signal);
    expect(await ended).toMatchObject({ signal });
    expect(listFolder(folder)).toEqual(["part.gcode", "tuned.gcode"]);
    expect(standing(folder)).toBe("what stood there before");
  });

  test("SIGTERM reaches it through npm", async () => {
    const { folder, child } = await runThatWrites({ program: ["npm", "run", "-s", "quenchline", "--"] });
    const ended = outcome(child);
    child.kill("SIGTERM");
    await ended;
    expect(listFolder(folder)).toEqual(["part.gcode", "tuned.gcode"]);
    expect(standing(folder)).toBe("what stood there before");
  });

  test("SIGKILL leaves a temporary file, which the next run removes; that of a run still going stays", async () => {
    const { folder, child } = await runThatWrites();
    const ended = outcome(child);
    child.kill("SIGKILL");
    await ended;
    const left = listFolder(folder).filter((name) => PART.test(name));
    expect(left).toHaveLength(1);
    expect(standing(folder)).toBe("what stood there before");

    const going = left[0].replace(PART, (name, pid: string) => name.replace(pid, String(process.pid)));
    writeFileSync(join(folder, going), "");
    const { status } = await quenchline(["tune", SEAL_RING, ...DOCUMENTS, "--out", join(folder, "other.gcode")]);
    expect(status).toBe(0);
    expect(listFolder(folder)).toEqual([going, "other.gcode", "part.gcode", "tuned.gcode"].sort());
  });
});

test("a toolpath that changes while it is tuned fails the proof: status 4, no OUT, and the proof says why", async () => {
  const proof = join(scratchFolder(), "proof.json");
  const { folder, child } = await runThatWrites({ more: ["--proof", proof, "--plan", `${proof}.plan`] });
  const ended = outcome(child);
  const file = openSync(join(folder, "part.gcode"), "r+");
  writeSync(file, "2", longPart.lastIndexOf("F1200") + 1);
  closeSync(file);
  const { status, stdout, stderr } = await ended;
  expect(stderr).toMatch(/the proof failed, so nothing was written under .*\n {2}FAILED {2}bytes-kept/);
  expect(stdout).toBe("");
  expect(status).toBe(4);
  expect(listFolder(folder)).toEqual(["part.gcode", "tuned.gcode"]);
  expect(standing(folder)).toBe("what stood there before");
  expect(parseProof(JSON.parse(readFileSync(proof, "utf8")))).toMatchObject({ passed: false });
  expect(existsSync(`${proof}.plan`)).toBe(false);
});

describe("where there is no room", () => {
  test("for the tuned file, it ends with status 1, says so, and leaves nothing", async () => {
    const folder = scratchFolder();
    const line = `ulimit -f 200; exec '${process.execPath}' '${LAUNCH}' tune '${SEAL_RING}' ${DOCUMENTS.map((it) => `'${it}'`).join(" ")} --out tuned.gcode`;
    // The bundle may be larger than that limit: it is made beforehand.
    await quenchline(["--version"]);
    const { status, stdout, stderr } = await outcome(start("bash", ["-c", line], { cwd: folder }));
    expect(stderr).toMatch(/nothing can be written in .*\nwhat to do: /);
    expect(stdout).toBe("");
    expect(status).toBe(1);
    expect(listFolder(folder)).toEqual([]);
  });

  test("for standard output, it ends with status 1 and says so", async () => {
    if (!existsSync("/dev/full")) return;
    const line = `'${process.execPath}' '${LAUNCH}' read '${SEAL_RING}' --machine '${TERN}' > /dev/full`;
    const { status, stderr } = await outcome(start("bash", ["-c", line]));
    expect(stderr).toContain("to standard output: the disk is full");
    expect(status).toBe(1);
  });
});

test("standard input leaves nothing in the folder for temporary files", async () => {
  const [folder, TMPDIR] = [scratchFolder(), scratchFolder()];
  const argv = ["tune", "-", ...DOCUMENTS, "--out", join(folder, "x.gcode")];
  const { status } = await quenchline(argv, { input: readFileSync(SEAL_RING), env: { TMPDIR } });
  expect(status).toBe(0);
  expect(listFolder(TMPDIR)).toEqual([]);
});

test("two runs that write the same OUT at the same time both succeed, and one whole file is there", async () => {
  const folder = scratchFolder();
  const argv = ["tune", SEAL_RING, ...DOCUMENTS, "--out", join(folder, "tuned.gcode")];
  const runs = await Promise.all([quenchline(argv), quenchline(argv), quenchline(argv)]);
  for (const run of runs) expect(run).toMatchObject({ status: 0, stderr: "" });
  expect(listFolder(folder)).toEqual(["tuned.gcode"]);
  const single = join(scratchFolder(), "tuned.gcode");
  await quenchline([...argv.slice(0, -1), single]);
  expectSame(readFileSync(join(folder, "tuned.gcode")), readFileSync(single));
});
