import { chmodSync, copyFileSync, linkSync, readFileSync, statSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { gunzipSync, gzipSync } from "node:zlib";
import { describe, expect, test } from "vitest";
import { parsePlan } from "#shared/formats/plan.ts";
import { parseProof } from "#shared/formats/proof.ts";
import {
  expectSame,
  listFolder,
  outcome,
  quenchline,
  ROOT,
  SEAL_RING,
  SEAL_RING_PROFILE,
  sample,
  scratchFolder,
  sha256,
  start,
  TERN,
} from "#tests/server/cli/command-line.ts";

const DOCUMENTS = ["--machine", TERN, "--profile", SEAL_RING_PROFILE];
const readJson = (path: string): unknown => JSON.parse(readFileSync(path, "utf8"));
const PROVENANCE = /^;quenchline (\{.*\})$/m;
const factsOf = (bytes: Buffer) => JSON.parse(PROVENANCE.exec(bytes.toString("latin1"))![1]);
const own = (bytes: Uint8Array) =>
  Buffer.from(bytes)
    .toString("latin1")
    .match(/;ql\r?\n/g)?.length ?? 0;

/** Tunes the seal ring into an empty folder. */
async function tuneSealRing() {
  const folder = scratchFolder();
  const out = join(folder, "tuned.gcode");
  const { status, stderr, stdout } = await quenchline(["tune", SEAL_RING, ...DOCUMENTS, "--out", out]);
  expect(stderr).toBe("");
  expect(status).toBe(0);
  return { folder, out, stdout, tuned: readFileSync(out) };
}

describe("--out", () => {
  test("writes the tuned toolpath and nothing else, and says what it did, with the cautions", async () => {
    const { folder, out, stdout, tuned } = await tuneSealRing();
    expect(listFolder(folder)).toEqual(["tuned.gcode"]);
    expect(own(tuned)).toBeGreaterThan(10);
    for (const text of [out, sha256(tuned), "45 layers", "Proof   passed", "Cautions", "start fires", "cut-out"])
      expect(stdout).toContain(text);
  });

  test("documents with versions give the provenance line their numbers, and nothing else", async () => {
    const { folder, tuned } = await tuneSealRing();
    const [machine, profile] = [
      ["machine.json", TERN, 2],
      ["profile.json", SEAL_RING_PROFILE, 5],
    ].map(([name, path, version]) => {
      const text = JSON.stringify({ ...(readJson(String(path)) as object), version });
      writeFileSync(join(folder, String(name)), text);
      return join(folder, String(name));
    });
    const out = join(folder, "versions.gcode");
    const documents = ["--machine", machine, "--profile", profile];
    expect(await quenchline(["tune", SEAL_RING, ...documents, "--out", out])).toMatchObject({ status: 0 });
    const [plain, versioned] = [tuned, readFileSync(out)].map((bytes) => factsOf(bytes));
    expect([plain.machine.version, plain.profile.version]).toEqual([undefined, undefined]);
    expect([versioned.machine.version, versioned.profile.version]).toEqual([2, 5]);
    expect(versioned.machine.sha256).toBe(plain.machine.sha256);
    expect(versioned.profile.sha256).toBe(plain.profile.sha256);
    const rest = (bytes: Buffer): string => bytes.toString("latin1").replace(PROVENANCE, "");
    expect(rest(readFileSync(out)) === rest(tuned)).toBe(true);
    expect(await quenchline(["prove", SEAL_RING, out, ...documents])).toMatchObject({ status: 0 });
    expect(await quenchline(["prove", SEAL_RING, out, ...DOCUMENTS])).toMatchObject({ status: 0 });
  });

  test("plan and proof are written beside it where they are asked for", async () => {
    const folder = scratchFolder();
    const [out, plan, proof] = ["tuned.gcode", "plan.json", "proof.json"].map((name) => join(folder, name));
    const argv = ["tune", SEAL_RING, ...DOCUMENTS, "--out", out, "--plan", plan, "--proof", proof];
    const { status } = await quenchline([...argv, "--polymer", sample("polymers/peek.json")]);
    expect(status).toBe(0);
    expect(parsePlan(readJson(plan)).layers).toHaveLength(45);
    expect(parseProof(readJson(proof))).toMatchObject({
      passed: true,
      input: { sha256: sha256(readFileSync(SEAL_RING)) },
      output: { sha256: sha256(readFileSync(out)) },
    });
    expect(listFolder(folder)).toEqual(["plan.json", "proof.json", "tuned.gcode"]);
  });

  test("standard input and gzip give the same bytes; an OUT that ends in .gz is packed, the same way every time", async () => {
    const { folder, tuned } = await tuneSealRing();
    const packed = join(folder, "part.gcode.gz");
    writeFileSync(packed, gzipSync(readFileSync(SEAL_RING)));
    const run = async (file: string, name: string, input?: Uint8Array) => {
      const out = join(folder, name);
      const { status, stderr } = await quenchline(["tune", file, ...DOCUMENTS, "--out", out], { input });
      expect(stderr).toBe("");
      expect(status).toBe(0);
      return readFileSync(out);
    };
    expectSame(await run("-", "1.gcode", readFileSync(SEAL_RING)), tuned);
    expectSame(await run("-", "2.gcode", readFileSync(packed)), tuned);
    expectSame(await run(packed, "3.gcode"), tuned);
    const once = await run(SEAL_RING, "4.gcode.gz");
    expectSame(gunzipSync(once), tuned);
    expectSame(await run("-", "5.gcode.gz", readFileSync(SEAL_RING)), once);
  });

  test("a named pipe is read as often as needed", async () => {
    const { folder, tuned } = await tuneSealRing();
    const [pipe, out] = [join(folder, "pipe"), join(folder, "2.gcode")];
    await outcome(start("mkfifo", [pipe]));
    const writing = outcome(start("bash", ["-c", `cat '${SEAL_RING}' > '${pipe}'`]));
    const { status } = await quenchline(["tune", pipe, ...DOCUMENTS, "--out", out]);
    await writing;
    expect(status).toBe(0);
    expectSame(readFileSync(out), tuned);
  });

  test("an older file is replaced and passes on its permissions; a link stays a link", async () => {
    const { folder, tuned } = await tuneSealRing();
    const [older, link] = [join(folder, "older.gcode"), join(folder, "link.gcode")];
    writeFileSync(older, "an older file");
    chmodSync(older, 0o640);
    symlinkSync(older, link);
    expect((await quenchline(["tune", SEAL_RING, ...DOCUMENTS, "--out", link])).status).toBe(0);
    expectSame(readFileSync(older), tuned);
    expect(statSync(older).mode & 0o777).toBe(0o640);
    expect(listFolder(folder)).toEqual(["link.gcode", "older.gcode", "tuned.gcode"]);
  });
});

describe("--in-place", () => {
  test("replaces the file, keeps its permissions, and tuning it again changes nothing", async () => {
    const { folder, tuned } = await tuneSealRing();
    const part = join(folder, "part.gcode");
    copyFileSync(SEAL_RING, part);
    chmodSync(part, 0o664);
    for (const _time of [1, 2]) {
      const { status, stderr } = await quenchline(["tune", part, ...DOCUMENTS, "--in-place"]);
      expect(stderr).toBe("");
      expect(status).toBe(0);
      expectSame(readFileSync(part), tuned);
    }
    expect(statSync(part).mode & 0o777).toBe(0o664);
    expect(listFolder(folder)).toEqual(["part.gcode", "tuned.gcode"]);
  });

  test("a packed file stays packed", async () => {
    const { folder, tuned } = await tuneSealRing();
    const part = join(folder, "part.gcode.gz");
    writeFileSync(part, gzipSync(readFileSync(SEAL_RING)));
    expect((await quenchline(["tune", part, ...DOCUMENTS, "--in-place"])).status).toBe(0);
    expectSame(gunzipSync(readFileSync(part)), tuned);
  });
});

describe("what can't be right is told before any work is done, with status 2", () => {
  const folder = () => {
    const path = scratchFolder();
    copyFileSync(SEAL_RING, join(path, "part.gcode"));
    linkSync(join(path, "part.gcode"), join(path, "same.gcode"));
    copyFileSync(TERN, join(path, "machine.json"));
    return path;
  };
  test.each([
    [[], "--out or --in-place is missing"],
    [["--out", "x.gcode", "--in-place"], "exclude each other"],
    [["--out", "part.gcode"], "--out and FILE are the same file, part.gcode; use --in-place"],
    [["--out", "same.gcode"], "--out and FILE are the same file"],
    [["--out", "machine.json"], "--out and --machine are the same file"],
    [["--out", "x.gcode", "--proof", "./x.gcode"], "--proof and --out are the same file"],
    [["--in-place", "--plan", "part.gcode"], "--plan and FILE are the same file"],
    [["--out", "nowhere/x.gcode"], "nowhere is not there"],
    [["--out", "."], "is a folder"],
    [["--out", "/dev/null"], "is a device or pipe"],
    [["--out", "-"], "standard output is not offered"],
  ])("%j", async (argv, message) => {
    const cwd = folder();
    const documents = ["--machine", "machine.json", "--profile", SEAL_RING_PROFILE];
    const { status, stdout, stderr } = await quenchline(["tune", "part.gcode", ...documents, ...argv], { cwd });
    expect(stderr).toContain(message);
    expect(stdout).toBe("");
    expect(status).toBe(2);
    expect(listFolder(cwd)).toEqual(["machine.json", "part.gcode", "same.gcode"]);
    expectSame(readFileSync(join(cwd, "part.gcode")), readFileSync(SEAL_RING));
  });

  test("standard input has no place to be put back in", async () => {
    const { status, stderr } = await quenchline(["tune", "-", ...DOCUMENTS, "--in-place"]);
    expect(stderr).toContain("standard input has no place");
    expect(status).toBe(2);
  });
});

describe("a refusal leaves no file behind and names the document it is about", () => {
  const refused = async (argv: string[]) => {
    const cwd = scratchFolder();
    const { status, stdout, stderr } = await quenchline(["tune", ...argv, "--out", join(cwd, "x.gcode")], { cwd });
    expect(status).toBe(3);
    expect(stdout).toBe("");
    expect(listFolder(cwd)).toEqual([]);
    return stderr;
  };

  test("the profile is for channels that the machine has not", async () => {
    const stderr = await refused([SEAL_RING, "--machine", TERN, "--profile", changedProfile(/"lamp"/g, '"halogen"')]);
    expect(stderr).toMatch(/where: .*profile\.json, zones\[0\]\.heating\.channel/);
  });

  test("the polymer card is for another polymer", async () => {
    const stderr = await refused([SEAL_RING, ...DOCUMENTS, "--polymer", sample("polymers/pps.json")]);
    expect(stderr).toContain('is "PEEK", but the polymer card is for "PPS"');
  });

  test("the part is higher than the zones", async () => {
    const profile = changedProfile(/"from": 6,/, '"from": 6, "to": 7,');
    expect(await refused([SEAL_RING, "--machine", TERN, "--profile", profile])).toMatch(
      /where: .*seal-ring\.gcode, .*layer 36/,
    );
  });

  test("the toolpath pauses in a way the machine does not list", async () => {
    const part = join(scratchFolder(), "part.gcode");
    writeFileSync(part, readFileSync(SEAL_RING, "latin1").replace(/(\r\n\(stratum 12 )/i, "\r\nM601$1"), "latin1");
    expect(await refused([part, ...DOCUMENTS])).toMatch(/M601[\s\S]*where: .*part\.gcode, line \d+/);
  });
});

function changedProfile(find: RegExp, replacement: string): string {
  const path = join(scratchFolder(), "profile.json");
  writeFileSync(path, readFileSync(SEAL_RING_PROFILE, "utf8").replace(find, replacement));
  return path;
}

test("from inside the samples, through npm, as a newcomer calls it", async () => {
  const folder = scratchFolder();
  const argv = ["tune", "samples/seal-ring.gcode", "--machine", "samples/machines/tern.json"];
  argv.push(
    "--profile",
    "samples/profiles/seal-ring-stiff-base-and-tough-lip.json",
    "--out",
    join(folder, "out.gcode"),
  );
  const { status, stderr } = await outcome(start("npm", ["run", "-s", "quenchline", "--", ...argv], { cwd: ROOT }));
  expect(stderr).toBe("");
  expect(status).toBe(0);
  expect(listFolder(folder)).toEqual(["out.gcode"]);
});
