import { describe, expect, test } from "vitest";
import { parseProof, writeProof } from "#shared/formats/proof.ts";
import { linesOf, plainTuning, sealed } from "#tests/shared/prove/plain-tuning.ts";
import { bytesOf, ENGINE, type Files, failures, proveFiles, readBytes, sha256 } from "#tests/shared/prove/proving.ts";
import { tuneBytes } from "#tests/shared/prove/real-tuning.ts";
import { smallMachine, smallPart, smallProfile } from "#tests/shared/prove/small-part.ts";

const machine = smallMachine();
const profile = smallProfile();
const original = smallPart({ pause: "M0" });
const tuned = plainTuning(original, machine, profile);
const reading = readBytes(bytesOf(original), machine);

const proofOf = (text: string, more: Partial<Files> = {}) =>
  proveFiles({ original: bytesOf(original), tuned: bytesOf(text), machine, profile, reading, ...more });

/** The lines of the tuned file changed, and its provenance line made to fit again. */
const resealed = (change: (lines: string[]) => string[]): string =>
  sealed(change(linesOf(tuned)), reading, machine, profile).join("");

describe("a proof that passes", () => {
  test("is a proof document, and counts every line of both files", async () => {
    const proof = await proofOf(tuned);
    expect(parseProof(JSON.parse(writeProof(proof)))).toEqual(proof);
    const { kept, removed, inserted, renumbered } = proof;
    expect(kept.lines + renumbered.lines + removed.lines).toBe(linesOf(original).length);
    expect(kept.lines + renumbered.lines + inserted.lines).toBe(linesOf(tuned).length);
    expect({ removed: removed.lines, inserted: inserted.lines, renumbered: renumbered.lines }).toEqual({
      removed: 3,
      inserted: 15,
      renumbered: 0,
    });
  });

  test("names the files, the documents and the engine", async () => {
    const proof = await proofOf(tuned);
    expect(proof.input).toEqual({ sha256: sha256(bytesOf(original)), bytes: original.length });
    expect(proof.output).toEqual({ sha256: sha256(bytesOf(tuned)), bytes: tuned.length });
    expect([proof.machine.name, proof.profile?.name, proof.engine]).toEqual([machine.name, profile.name, ENGINE]);
  });

  test("says what was found, check by check", async () => {
    const { checks } = await proofOf(tuned);
    expect(checks.map(({ id, detail }) => `${id}: ${detail}`)).toMatchInlineSnapshot(`
      [
        "bytes-kept: 82 lines of the original stand in the tuned file byte for byte, in their order.",
        "readers-agree: Two readers find the same 7 output commands and pauses in the original.",
        "removed-only-driven: 3 commands of part-fan and lamp between first and last layer taken out; nothing else.",
        "inserted-legal: 14 commands put in, each of part-fan and lamp in the machine's own form and resolution.",
        "inserted-inside: All lines of ours stand between line 11 of the original, where the first layer begins, and line 82, where the last has ended.",
        "provenance: One line, where the first layer begins: profile "Square, “stiff”", machine "Petrel — n°2", trial-only, engine 0.0.0-test.",
        "seal: The seal fits the provenance line, 14 commands of ours and the raises kept, each in its place.",
        "within-layer: None of the file's own commands on driven channels is left among the layers.",
        "limits: part-fan up to 0.6 (allowed: off or at least 0.12, at most 0.9); lamp up to 0.702 (allowed: at most 0.8).",
        "change-per-layer: From layer to layer: lamp changes by up to 0.102 (allowed: 0.2).",
        "rate: No driven channel has a largest change per second.",
        "heater-before-first-layer: No line of ours sets a heater before the first layer.",
        "pauses-idle: At 1 pause among the layers every driven heater is idle.",
        "off-at-end: lamp off behind the last layer (line 82 of the original), and nothing switches a heater on after that.",
        "plan: The plan was computed afresh: at every one of 6 layers the duty of part-fan and lamp is in force when it is wanted.",
        "motion: No line put in or taken out moves, waits or dwells, so motion is the same and print time stays 51.7 s.",
      ]
    `);
  });

  test("is the same however the files are cut into chunks", async () => {
    const whole = await proofOf(tuned);
    for (const chunk of [1, 2, 7, 64, 1000]) expect(await proofOf(tuned, { chunk })).toEqual(whole);
  });

  test("without a profile makes no check of the plan", async () => {
    const proof = await proofOf(tuned, { profile: undefined });
    expect(proof.passed).toBe(true);
    expect(proof.profile).toBeNull();
    expect(proof.checks.map(({ id }) => id)).not.toContain("plan");
  });

  test("says of a numbered file how many lines have new numbers", async () => {
    const numbered = smallPart({ numbered: true });
    const text = plainTuning(numbered, machine, profile);
    const proof = await proveFiles({ original: bytesOf(numbered), tuned: bytesOf(text), machine, profile });
    expect(failures(proof)).toEqual([]);
    expect(proof.renumbered.lines).toBe(63);
  });

  test("passes a file that is tuned a second time, whatever of ours stood in it", async () => {
    const made = tuneBytes(bytesOf(original), machine, profile);
    const other = smallProfile({ limits: { lamp: { maxDuty: 0.5 } } });
    const anew = tuneBytes(made, machine, other);
    expect(anew).not.toEqual(made);
    const proof = await proveFiles({ original: made, tuned: anew, machine, profile: other });
    expect(failures(proof)).toEqual([]);
    expect(proof.removed.lines).toBe(linesOf(made.toString("latin1")).filter((line) => line.includes(";q")).length);
  });
});

const lineWith = (lines: readonly string[], part: string, last = false): number =>
  last ? lines.map((line) => line.includes(part)).lastIndexOf(true) : lines.findIndex((line) => line.includes(part));

const spliced = (lines: readonly string[], at: number, gone: number, ...put: string[]): string[] => [
  ...lines.slice(0, at),
  ...put.map((line) => `${line}\n`),
  ...lines.slice(at + gone),
];
type Change = (lines: string[]) => string[];
const without =
  (part: string, last = false): Change =>
  (lines) =>
    spliced(lines, lineWith(lines, part, last), 1);
const inFrontOf =
  (part: string, put: string): Change =>
  (lines) =>
    spliced(lines, lineWith(lines, part), 0, put);
const behind =
  (part: string, put: string): Change =>
  (lines) =>
    spliced(lines, lineWith(lines, part) + 1, 0, put);
const inPlaceOf =
  (part: string, by: string, last = false): Change =>
  (lines) =>
    spliced(lines, lineWith(lines, part, last), 1, by);

describe("each check finds what it is for, although the seal fits", () => {
  test.each<[string, string, Change]>([
    ["bytes-kept", "a move is changed", inPlaceOf("G1 X40 Y10 E0.80", "G1 X41 Y10 E0.80 F1500")],
    ["bytes-kept", "a move is missing", without("G1 X40 Y10 E0.80")],
    ["bytes-kept", "a move is put in", inFrontOf("G1 X40 Y10 E0.80", "G1 X1 F600")],
    ["removed-only-driven", "another fan's command is taken out", without("M42 P7 S90")],
    ["removed-only-driven", "the fan's command of the start is taken out", without("M106 S0\n")],
    ["inserted-legal", "a duty without the word for it", inPlaceOf("M106 P2 S179 ;ql", "M106 P2 ;ql")],
    ["inserted-legal", "a command of an output that is not driven", inFrontOf(";LAYER:2", "M42 P7 S9 ;ql")],
    ["inserted-legal", "a move with our tag", inFrontOf(";LAYER:2", "G1 X1 F600 ;ql")],
    ["inserted-inside", "a lamp command in the start script", inFrontOf("G92 E0", "M106 P2 S9 ;ql")],
    ["inserted-inside", "a command between two laying moves", inFrontOf("G1 X40 Y40 E1.60", "M106 S40 ;ql")],
    ["provenance", "no provenance line", (lines) => lines.filter((line) => !line.startsWith(";quenchline"))],
    ["within-layer", "a command of the file is left", behind("E6.40", "M106 S128")],
    ["limits", "the lamp above its limit", inPlaceOf("M106 P2 S179 ;ql", "M106 P2 S205 ;ql")],
    ["limits", "the fan in its dead band", inPlaceOf("M106 S34 ;ql", "M106 S20 ;ql")],
    ["heater-before-first-layer", "the lamp lit in the start script", inFrontOf("G92 E0", "M106 P2 S9 ;ql")],
    ["pauses-idle", "the lamp lit at a pause", without("M106 P2 S0 ;ql")],
    ["off-at-end", "the lamp left on", without("M106 P2 S0 ;ql", true)],
    ["off-at-end", "the lamp turned down only", inPlaceOf("M106 P2 S0 ;ql", "M106 P2 S1 ;ql", true)],
    ["plan", "a layer without its duty", without("M106 S34 ;ql")],
    ["plan", "another duty", inPlaceOf("M106 S34 ;ql", "M106 S35 ;ql")],
  ])("%s: %s", async (id, _, change) => {
    expect(failures(await proofOf(resealed(change))).map((failure) => failure.split(":")[0])).toContain(id);
  });

  test("seal: a command of ours set otherwise", async () => {
    const found = failures(await proofOf(tuned.replace("M106 S34 ;ql", "M106 S35 ;ql")));
    expect(found.some((failure) => failure.startsWith("seal:"))).toBe(true);
  });

  test("rate: a machine that may not change so fast", async () => {
    const slow = smallMachine({ lamp: { maxDutyPerS: 0.01 } });
    const found = failures(await proofOf(tuned, { machine: slow, reading: readBytes(bytesOf(original), slow) }));
    expect(found.map((failure) => failure.split(":")[0])).toContain("rate");
  });

  test("pauses-idle: a pause that the machine document does not list", async () => {
    const text = smallPart({ pause: "M25" });
    const made = plainTuning(text, machine, profile);
    const found = failures(await proveFiles({ original: bytesOf(text), tuned: bytesOf(made), machine, profile }));
    expect(found).toEqual([expect.stringContaining("pauses-idle: The machine document does not list the pause M25")]);
  });

  test("off-at-end: a heater that is not driven and left on by the file itself", async () => {
    const channels = [
      ...machine.channels,
      { ...machine.channels[1], id: "shelf", drive: { by: "pin", pin: 9, fullScale: 255 } },
    ];
    const more = { ...machine, channels } as typeof machine;
    const text = original.replace("M107\n", "M42 P9 S40\nM107\n");
    const made = plainTuning(text, more, profile);
    const found = failures(await proveFiles({ original: bytesOf(text), tuned: bytesOf(made), machine: more, profile }));
    expect(found).toEqual([expect.stringContaining("off-at-end: The file leaves shelf on")]);
  });

  test("off-at-end: a driven heater that the end script lights again", async () => {
    const text = original.replace("M107\n", "M106 P2 S40\nM107\n");
    const made = plainTuning(text, machine, profile);
    const found = failures(await proveFiles({ original: bytesOf(text), tuned: bytesOf(made), machine, profile }));
    expect(found).toEqual([expect.stringContaining("off-at-end: lamp is set to 0.157 again at line")]);
  });

  test("provenance: another machine, profile, engine or status", async () => {
    const idOf = async (more: Partial<Files>) =>
      failures(await proofOf(tuned, more)).map((failure) => failure.split(":")[0]);
    expect(await idOf({ machine: { ...machine, name: "Another" } })).toEqual(["provenance"]);
    expect(await idOf({ profile: { ...profile, polymer: "PPS" } })).toEqual(["provenance"]);
    expect(await idOf({ expected: { engine: "9.9.9" } })).toEqual(["provenance"]);
    expect(await idOf({ expected: { status: "approved" } })).toEqual(["provenance"]);
    expect(await idOf({ machine: { ...machine, version: 1 } })).toEqual(["provenance"]);
    expect(await idOf({ profile: { ...profile, version: 3 } })).toEqual(["provenance"]);
  });

  test("bytes-kept: a reading of another file", async () => {
    const other = readBytes(bytesOf(original.replace("Z20", "Z21")), machine);
    expect(failures(await proofOf(tuned, { reading: other }))).toEqual([
      expect.stringContaining("bytes-kept: The original of"),
      expect.stringContaining("provenance:"),
      expect.stringContaining("motion:"),
    ]);
  });

  test("a reading that missed a command is found out", async () => {
    const controls = reading.controls.filter(({ layer }) => layer !== 2);
    const found = failures(await proofOf(tuned, { reading: { ...reading, controls } }));
    expect(found[0]).toMatch(/^readers-agree: At line \d+ of the original \(layer 2\)/);
  });
});

test("both streams are read to their ends even where the files part at once, and errors of reading are passed on", async () => {
  const text = `G0${tuned.slice(2)}`;
  let read = 0;
  const { prove } = await import("#shared/prove/prove.ts");
  async function* counted(bytes: Uint8Array) {
    for (let at = 0; at < bytes.length; at += 50) {
      read += Math.min(50, bytes.length - at);
      yield bytes.subarray(at, at + 50);
    }
  }
  const hashes = () => ({
    input: { sha256: reading.file.sha256, bytes: original.length },
    output: { sha256: "", bytes: 0 },
  });
  const rest = { reading, machine, profile, digest: sha256, engine: ENGINE, hashes };
  const proof = await prove({ original: counted(bytesOf(original)), tuned: counted(bytesOf(text)), ...rest });
  expect(proof.passed).toBe(false);
  expect(proof.checks.map(({ id }) => id)).toEqual(["bytes-kept"]);
  expect(read).toBe(original.length + text.length);
  // biome-ignore lint/correctness/useYield: it fails before it yields
  async function* broken(): AsyncGenerator<Uint8Array> {
    throw new Error("the disk is gone");
  }
  await expect(prove({ original: counted(bytesOf(original)), tuned: broken(), ...rest })).rejects.toThrow(
    "the disk is gone",
  );
});
