import { readFileSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { gzipSync } from "node:zlib";
import { describe, expect, test } from "vitest";
import { parseReading } from "#shared/formats/reading.ts";
import {
  listFolder,
  outcome,
  quenchline,
  ROOT,
  SEAL_RING,
  sample,
  scratchFolder,
  sha256,
  smallPart,
  start,
  TERN,
} from "#tests/server/cli/command-line.ts";

const readJson = async (file: string, input?: Uint8Array | string) => {
  const { status, stdout, stderr } = await quenchline(["read", file, "--machine", TERN, "--json"], { input });
  expect(stderr).toBe("");
  expect(status).toBe(0);
  return parseReading(JSON.parse(stdout));
};

describe("--json", () => {
  test("puts one reading document on standard output and nothing else", async () => {
    const reading = await readJson(SEAL_RING);
    const bytes = readFileSync(SEAL_RING);
    expect(reading.file).toMatchObject({ bytes: bytes.length, sha256: sha256(bytes), newline: "crlf" });
    expect(reading.layers).toHaveLength(45);
    expect(reading.totals.layers).toBe(45);
    expect(reading.layers[0]).toMatchObject({ index: 1, zMm: 0.2, heightMm: 0.2 });
    expect(Object.keys(reading.layers[0].duty)).toEqual(["lamp", "part-fan"]);
  });

  test("a gzip file, with or without the ending, and standard input, packed or not, give the same reading", async () => {
    const folder = scratchFolder();
    const packed = gzipSync(readFileSync(SEAL_RING));
    writeFileSync(join(folder, "part.gcode.gz"), packed);
    writeFileSync(join(folder, "part.gcode"), packed);
    const plain = await readJson(SEAL_RING);
    expect(await readJson(join(folder, "part.gcode.gz"))).toEqual(plain);
    expect(await readJson(join(folder, "part.gcode"))).toEqual(plain);
    expect(await readJson("-", readFileSync(SEAL_RING))).toEqual(plain);
    expect(await readJson("-", packed)).toEqual(plain);
  });
});

describe("the table", () => {
  test("has a row for every layer, units in its head, points below one another, and at most 120 columns", async () => {
    const { status, stdout, stderr } = await quenchline(["read", sample("mast-bracket.gcode"), "--machine", TERN]);
    expect(status).toBe(0);
    expect(stderr).toBe("");
    const lines = stdout.split("\n");
    const head = lines.findIndex((line) => line.startsWith("layer"));
    expect(lines[head]).toMatch(/layer +z +height +time +extruding +deposited +travel +volume +part-fan +lamp +waits/);
    expect(lines[head + 1]).toMatch(/mm +mm +s +s +mm +mm +mm³$/);
    const rows = lines.slice(head + 2, head + 2 + 305);
    expect(rows.map((row) => Number(row.slice(0, 5)))).toEqual(Array.from({ length: 305 }, (_, k) => k + 1));
    const points = (row: string) =>
      [...row.matchAll(/\./g)]
        .map(({ index }) => index)
        .slice(0, 9)
        .join();
    expect(new Set(rows.map(points)).size).toBe(1);
    for (const line of lines.slice(1, head + 2 + 305 + 4)) expect(line.length).toBeLessThanOrEqual(120);
    const total = lines[head + 2 + 305].split(/ +/).map(Number);
    const { totals } = await readJson(sample("mast-bracket.gcode"));
    expect(total[1]).toBeCloseTo(totals.printTimeS, 1);
    expect(total[3]).toBeCloseTo(totals.depositedLengthMm, 0);
    expect(stdout).toContain("305 layers, print time ");
    expect(stdout).toContain("Findings");
  });

  test("leaves out channels there is no room for, and says so", async () => {
    const folder = scratchFolder();
    const machine = JSON.parse(readFileSync(TERN, "utf8"));
    for (let index = 3; index < 12; index++)
      machine.channels.push({
        ...machine.channels[0],
        id: `fan-${index}`,
        drive: { by: "fan-index", index, fullScale: 255 },
      });
    writeFileSync(join(folder, "machine.json"), JSON.stringify(machine));
    const { stdout } = await quenchline(["read", SEAL_RING, "--machine", join(folder, "machine.json")]);
    expect(stdout).toMatch(/No room for fan-.*fan-11: --json has every channel/);
    for (const line of stdout.split("\n").slice(2, 40)) expect(line.length).toBeLessThanOrEqual(120);
  });

  test("text of the file can't steer the terminal", async () => {
    const name = join(scratchFolder(), "part\u001b[31m.gcode");
    writeFileSync(name, smallPart());
    const { stdout } = await quenchline(["read", name, "--machine", TERN]);
    expect(stdout).not.toContain("\u001b");
    expect(stdout).toContain("part\\u{1b}[31m.gcode");
  });
});

describe("paths are taken from where the caller is", () => {
  const argv = (file: string) => ["read", file, "--machine", "machines/tern.json", "--json"];

  test("when called through npm from a folder inside the project", async () => {
    const { status, stdout } = await outcome(
      start("npm", ["run", "-s", "quenchline", "--", ...argv("seal-ring.gcode")], { cwd: sample("") }),
    );
    expect(status).toBe(0);
    expect(JSON.parse(stdout).layers).toHaveLength(45);
  });

  test("when called directly, whatever an npm script around it has left in the environment", async () => {
    const env = { npm_lifecycle_event: "test", INIT_CWD: ROOT };
    const { status } = await quenchline(argv("seal-ring.gcode"), { cwd: sample(""), env });
    expect(status).toBe(0);
  });
});

describe("a refused input ends with status 3 and says what, where and what to do", () => {
  const refused = async (
    file: string,
    { machine = TERN, input }: { machine?: string; input?: string | Uint8Array } = {},
  ) => {
    const { status, stdout, stderr } = await quenchline(["read", file, "--machine", machine, "--json"], { input });
    expect(status).toBe(3);
    expect(stderr).toMatch(/^quenchline: [\s\S]+\nwhere: .+\nwhat to do: .+\n$/);
    const refusal = JSON.parse(stdout);
    expect(refusal).toMatchObject({
      format: "quenchline.refusal/1",
      file: expect.any(String),
      remedy: expect.any(String),
    });
    expect(stderr).toContain(refusal.message.split("\n")[0]);
    return { ...refusal, stderr };
  };

  test("without --json nothing is on standard output", async () => {
    const { status, stdout, stderr } = await quenchline(["read", "no-such.gcode", "--machine", TERN]);
    expect(status).toBe(3);
    expect(stdout).toBe("");
    expect(stderr).toContain("no-such.gcode");
  });

  test("a file that is not there, a folder, an unreadable document", async () => {
    expect(await refused("no-such.gcode")).toMatchObject({ code: "not-found", file: "no-such.gcode" });
    expect(await refused(ROOT)).toMatchObject({ code: "not-a-file", file: ROOT });
    expect(await refused(SEAL_RING, { machine: "no-such.json" })).toMatchObject({
      code: "not-found",
      file: "no-such.json",
    });
  });

  test("a damaged line of a numbered file is named", async () => {
    const lines = readFileSync(sample("valve-plate.gcode"), "latin1").split("\n");
    lines[99] = lines[99].replace(/\d(?= ?\*|\*)/, (digit) => String((Number(digit) + 1) % 10));
    const refusal = await refused("-", { input: Buffer.from(lines.join("\n"), "latin1") });
    expect(refusal).toMatchObject({ code: "checksum", line: 100, file: "-" });
    expect(refusal.stderr).toContain("where: standard input, line 100");
  });

  test("a packed file that goes on long after the damaged line ends at once, too", async () => {
    const lines = readFileSync(sample("valve-plate.gcode"), "latin1").repeat(5).split("\n");
    lines[999] = lines[999].replace(/\d(?= ?\*|\*)/, (digit) => String((Number(digit) + 1) % 10));
    const input = gzipSync(Buffer.from(lines.join("\n"), "latin1"), { level: 1 });
    expect(await refused("-", { input })).toMatchObject({ code: "checksum", line: 1000 });
  });

  test("what is not G-code, or empty, or extrudes nothing", async () => {
    expect(await refused("-", { input: "PK\u0003\u0004 and so on" })).toMatchObject({ code: "not-gcode" });
    expect(await refused("-", { input: "" })).toMatchObject({ code: "empty" });
    expect(await refused("-", { input: "G28\nG1 X10 F600\n" })).toMatchObject({ code: "no-extrusion" });
  });

  test("broken gzip: cut short, altered, or no gzip at all behind the ending", async () => {
    const folder = scratchFolder();
    const packed = gzipSync(readFileSync(SEAL_RING));
    const altered = Buffer.from(packed);
    altered[packed.length - 6] ^= 1;
    const cases = {
      "cut.gz": packed.subarray(0, packed.length / 2),
      "altered.gz": altered,
      "plain.gz": readFileSync(SEAL_RING),
      "empty.gz": Buffer.alloc(0),
    };
    for (const [name, bytes] of Object.entries(cases)) {
      writeFileSync(join(folder, name), bytes);
      expect(await refused(join(folder, name))).toMatchObject({ code: "broken-gzip" });
    }
    expect(await refused("-", { input: packed.subarray(0, 500) })).toMatchObject({ code: "broken-gzip" });
  });

  test("a document that is not JSON, or has a wrong field, or is another document", async () => {
    const machine = join(scratchFolder(), "machine.json");
    writeFileSync(machine, '{ "format": "quenchline.machine/1",\n  "name": Tern }');
    const broken = await refused(SEAL_RING, { machine });
    expect(broken).toMatchObject({ code: "bad-json", file: machine });
    expect(broken.message).toContain("line 2");

    const tern = JSON.parse(readFileSync(TERN, "utf8"));
    tern.channels[1].maxDuty = 1.4;
    writeFileSync(machine, JSON.stringify(tern));
    const wrong = await refused(SEAL_RING, { machine });
    expect(wrong).toMatchObject({ code: "bad-machine", path: "channels[1].maxDuty" });
    expect(wrong.stderr).toContain("channels[1].maxDuty");

    const profile = sample("profiles/seal-ring-stiff-base-and-tough-lip.json");
    expect((await refused(SEAL_RING, { machine: profile })).message).toContain("this is a profile document");
    writeFileSync(machine, Buffer.from([0x7b, 0xff, 0x7d]));
    expect((await refused(SEAL_RING, { machine })).message).toContain("UTF-8");
  });
});

test("a link to a file is read", async () => {
  const folder = scratchFolder();
  symlinkSync(SEAL_RING, join(folder, "link.gcode"));
  expect((await readJson(join(folder, "link.gcode"))).layers).toHaveLength(45);
  expect(listFolder(folder)).toEqual(["link.gcode"]);
});

test("a reader that has seen enough, as head does, is no failure", async () => {
  const line = `'${process.execPath}' server/cli/launch.mjs read samples/mast-bracket.gcode --machine '${TERN}' --json | head -c 100; exit \${PIPESTATUS[0]}`;
  const { status, stdout, stderr } = await outcome(start("bash", ["-c", line]));
  expect(stderr).toBe("");
  expect(status).toBe(0);
  expect(stdout).toHaveLength(100);
});
