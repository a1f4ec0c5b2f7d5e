import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { gzipSync } from "node:zlib";
import { expect, test } from "vitest";
import { parseProof } from "#shared/formats/proof.ts";
import {
  quenchline,
  SEAL_RING,
  SEAL_RING_PROFILE,
  scratchFolder,
  sha256,
  TERN,
} from "#tests/server/cli/command-line.ts";

const MACHINE = ["--machine", TERN];
const PROFILE = ["--profile", SEAL_RING_PROFILE];

/** The tuned seal ring, with a change where one is wanted. */
async function tunedFile(change = (text: string) => text): Promise<string> {
  const path = join(scratchFolder(), "tuned.gcode");
  const { status } = await quenchline(["tune", SEAL_RING, ...MACHINE, ...PROFILE, "--out", path]);
  expect(status).toBe(0);
  writeFileSync(path, change(readFileSync(path, "latin1")), "latin1");
  return path;
}

test("a tuned file passes, with the profile and without; --json puts one proof document on standard output", async () => {
  const tuned = await tunedFile();
  const shown = await quenchline(["prove", SEAL_RING, tuned, ...MACHINE, ...PROFILE]);
  expect(shown).toMatchObject({ status: 0, stderr: "" });
  expect(shown.stdout).toMatch(/passed {2}bytes-kept[\s\S]*Proof passed: \d+ checks\.\n$/);

  const { status, stdout, stderr } = await quenchline(["prove", SEAL_RING, tuned, ...MACHINE, "--json"]);
  expect(stderr).toBe("");
  expect(status).toBe(0);
  expect(parseProof(JSON.parse(stdout))).toMatchObject({
    passed: true,
    input: { sha256: sha256(readFileSync(SEAL_RING)) },
    output: { sha256: sha256(readFileSync(tuned)) },
    profile: null,
    machine: { name: "Tern" },
  });
});

test("a changed move fails with status 4, and the check that failed is named", async () => {
  const tuned = await tunedFile((text) => text.replace(/g1 x(\d)/gi, (_, digit: string) => `g1 x${9 - Number(digit)}`));
  const shown = await quenchline(["prove", SEAL_RING, tuned, ...MACHINE]);
  expect(shown).toMatchObject({ status: 4, stderr: "" });
  expect(shown.stdout).toMatch(/FAILED {2}bytes-kept .*line \d+/);
  expect(shown.stdout).toContain("Proof failed");

  const { status, stdout, stderr } = await quenchline(["prove", SEAL_RING, tuned, ...MACHINE, "--json"]);
  expect(status).toBe(4);
  expect(parseProof(JSON.parse(stdout)).passed).toBe(false);
  expect(stderr).toContain("FAILED  bytes-kept");
});

test("a lamp duty above the machine's limit fails", async () => {
  const tuned = await tunedFile((text) => text.replace("M106 P2 S96 ;ql", "M106 P2 S250 ;ql"));
  const { status, stdout } = await quenchline(["prove", SEAL_RING, tuned, ...MACHINE]);
  expect(stdout).toMatch(/FAILED {2}limits .*0\.98/);
  expect(status).toBe(4);
});

test("either file may be gzip or standard input", async () => {
  const tuned = await tunedFile();
  const packed = gzipSync(readFileSync(SEAL_RING));
  expect(await quenchline(["prove", "-", tuned, ...MACHINE], { input: packed })).toMatchObject({ status: 0 });
  writeFileSync(`${tuned}.gz`, gzipSync(readFileSync(tuned)));
  const input = readFileSync(SEAL_RING);
  expect(await quenchline(["prove", "-", `${tuned}.gz`, ...MACHINE], { input })).toMatchObject({ status: 0 });
});

test("a file that can't be read is refused with status 3 and its name", async () => {
  const refusal = async (original: string, tuned: string) => {
    const { status, stdout, stderr } = await quenchline(["prove", original, tuned, ...MACHINE, "--json"]);
    expect(status).toBe(3);
    expect(stderr).toContain("where: ");
    return JSON.parse(stdout);
  };
  expect(await refusal(SEAL_RING, "no-such.gcode")).toMatchObject({ code: "not-found", file: "no-such.gcode" });
  const cut = join(scratchFolder(), "cut.gcode.gz");
  writeFileSync(cut, gzipSync(readFileSync(SEAL_RING)).subarray(0, 3000));
  expect(await refusal(SEAL_RING, cut)).toMatchObject({ code: "broken-gzip", file: cut });
  expect(await refusal(TERN, SEAL_RING)).toMatchObject({ code: "not-gcode", file: TERN });
});
