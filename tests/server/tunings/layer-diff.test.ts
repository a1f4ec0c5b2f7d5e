import { beforeAll, expect, test } from "vitest";
import { hunksOf } from "#server/tunings/diff-hunks.ts";
import { updateTuning } from "#server/tunings/queries.ts";
import { doneTuning } from "#server/tunings/service.ts";
import { tunedName } from "#server/tunings/tuned-name.ts";
import type { DiffHunk } from "#shared/contract/tunings.ts";
import { testServer } from "#tests/helpers/server.ts";
import { addMachine, endedTuning, sampleJson, tuneSample, uploadAndRead } from "#tests/helpers/workshop.ts";

const server = testServer({ WORKERS: "1" });
beforeAll(() => server.parts.workshop.start());

const linesOf = (text: string): string[] => text.match(/[^\r\n]*(\r\n|\r|\n)|[^\r\n]+$/g) ?? [];
const unnumbered = (line: string): string => line.replace(/^N\d+ |\*\d+/g, "");

type Form = "plain" | "crlf" | "numbered";

/** Four layers of some 270 kB each; the file sets the fan at a layer's beginning and twice far inside. */
function longLayers(form: Form): Buffer {
  const lines = ["G28", "M83"];
  for (let layer = 1; layer <= 4; layer++) {
    lines.push(`G0 Z${(layer * 0.2).toFixed(1)}`, `M106 S${40 * layer}`);
    for (let k = 0; k < 9_000; k++) {
      lines.push(`G1 X${(50 + (k % 700) / 7).toFixed(3)} Y${(50 + (k % 13)).toFixed(3)} E0.02${k % 10} F1800`);
      if (k === 3_000 || k === 8_000) lines.push("G0 X50 Y50", `M106 S${100 + layer}`);
    }
  }
  return Buffer.from(lines.map((line, k) => written(line, k + 1, form)).join(""));
}

function written(line: string, number: number, form: Form): string {
  if (form !== "numbered") return `${line}${form === "crlf" ? "\r\n" : "\n"}`;
  const text = `N${number} ${line}`;
  return `${text}*${[...text].reduce((sum, character) => sum ^ character.charCodeAt(0), 0)}\n`;
}

async function tuneLongLayers(form: Form) {
  const file = longLayers(form);
  const { reading } = await uploadAndRead(server, await addMachine(server), file);
  const document = sampleJson("../tests/bench/profile.json");
  const profile = await server.as("engineer").post("/api/profiles").send({ document }).expect(201);
  const request = { readingId: reading.id, profileId: profile.body.id, profileVersion: 1 };
  const { body } = await server.as("engineer").post("/api/tunings").send(request).expect(201);
  const tuning = await endedTuning(server, body.id);
  const pieces: Uint8Array[] = [];
  for await (const piece of await server.parts.workshop.shelf.storage.open(tuning.tuned!.sha256)) pieces.push(piece);
  return { tuning, original: linesOf(file.toString()), tuned: linesOf(Buffer.concat(pieces).toString()) };
}

/** Lines of a file with those of every hunk's side taken out of it, which have to stand where they say. */
function without(lines: readonly string[], parts: readonly { firstLine: number; text: string }[]): string[] {
  const rest: string[] = [];
  let at = 0;
  for (const { firstLine, text } of parts) {
    const shown = linesOf(text);
    expect(lines.slice(firstLine - 1, firstLine - 1 + shown.length)).toEqual(shown);
    expect(firstLine - 1).toBeGreaterThanOrEqual(at);
    rest.push(...lines.slice(at, firstLine - 1), "(a hunk)");
    at = firstLine - 1 + shown.length;
  }
  return [...rest, ...lines.slice(at)];
}

test.each(["plain", "crlf", "numbered"] as const)(
  "layers too long to be sent whole, of a %s file: every change is in a hunk, and between the hunks both files are the same",
  async (form) => {
    const { tuning, original, tuned } = await tuneLongLayers(form);
    const hunks: DiffHunk[] = [];
    for (let layer = 1; layer <= 4; layer++) {
      const { body } = await server.as("viewer").get(`/api/tunings/${tuning.id}/layers/${layer}/diff`).expect(200);
      expect(body.shows).toBe("changes");
      // Its beginning, and the file's own fan commands far inside: those are gone on the right.
      // The file's own fan commands far inside are gone on the right.
      const own = `M106 S${100 + layer}`;
      const holding = body.hunks.filter((hunk: DiffHunk) =>
        linesOf(hunk.original.text).some((line) => line.includes(own)),
      );
      expect(holding).toHaveLength(2);
      expect(body.hunks.filter((hunk: DiffHunk) => hunk.tuned.text.includes(own))).toEqual([]);
      for (const { original: shown } of body.hunks) expect(linesOf(shown.text).length).toBeLessThan(20);
      hunks.push(...body.hunks);
    }
    const left = without(
      original,
      hunks.map((hunk) => hunk.original),
    );
    const right = without(
      tuned,
      hunks.map((hunk) => hunk.tuned),
    );
    expect(tuned.join("")).toContain(";ql");
    expect(right.join("")).not.toContain(";ql");
    expect(left.map(unnumbered)).toEqual(right.map(unnumbered));
  },
);

test("a layer with more changes than are sent at once says so, and shows the first of them", async () => {
  const { tuning } = await tuneLongLayers("plain");
  const row = await doneTuning(server.parts.db, server.person("viewer").teamId, tuning.id);
  const { storage } = server.parts.workshop.shelf;
  const edit = { offset: 500, line: 20, tunedOffset: 500, tunedLine: 20, removedLines: 0, insertedLines: 0 };
  // Every tenth line of the file's first layer, whatever stands there.
  const edits = Array.from({ length: 700 }, (_, k) => ({ ...edit, line: 20 + 10 * k, tunedLine: 20 + 10 * k }));
  const begin = { offset: 0, line: 1, tunedOffset: 0, tunedLine: 1, firstEdit: 0 };
  const end = { offset: 270_000, line: 9_000, tunedOffset: 270_000, tunedLine: 9_000, firstEdit: 700 };
  const sides = { original: row.toolpath.sha256, tuned: row.toolpath.sha256 };
  const { hunks, shows } = await hunksOf(storage, sides, edits, begin, end);
  expect(shows).toBe("first-changes");
  expect(hunks).toHaveLength(500);
});

test("a tuning whose proof failed keeps its plan and proof, but has no file and no diff", async () => {
  const { tuning } = await tuneSample(server, "seal-ring");
  const failed = { tunedSha256: null, tunedBytes: null, proven: { passed: false, checks: 12 } };
  await updateTuning(server.parts.db, tuning.id, failed);
  const tuned = await server.as("engineer").get(`/api/tunings/${tuning.id}`).expect(200);
  expect(tuned.body).toMatchObject({ state: "done", proof: { passed: false } });
  expect(tuned.body.tuned).toBeUndefined();
  for (const path of ["file", "layers/1/diff"]) {
    const { body } = await server.as("engineer").get(`/api/tunings/${tuning.id}/${path}`).expect(409);
    expect(body.code).toBe("proof-failed");
  }
  await server.as("viewer").get(`/api/tunings/${tuning.id}/proof`).expect(200);
});

test.each([
  ["part.gcode", "part.seal-ring-v2.tuned.gcode"],
  ["part.v2.g", "part.v2.seal-ring-v2.tuned.g"],
  ["part.tuned.gcode", "part.seal-ring-v2.tuned.gcode"],
  ["part.mast-bracket-v11.tuned.gcode", "part.seal-ring-v2.tuned.gcode"],
  ["part", "part.seal-ring-v2.tuned.gcode"],
  [".gcode", ".gcode.seal-ring-v2.tuned.gcode"],
])("the tuned file of %s is called %s", (original, name) => {
  expect(tunedName(original, { name: "Seal ring", version: 2 })).toBe(name);
});

test.each([
  ["Seal ring, stiff base", "seal-ring-stiff-base"],
  ["Düse – für PEEK", "duse-fur-peek"],
  ["封", "profile"],
  [`${"long ".repeat(20)}name`, "long-long-long-long-long-long-long-long-long"],
  ["x".repeat(60), "x".repeat(24)],
])("the profile %s is %s in a file's name", (name, slug) => {
  expect(tunedName("part.gcode", { name, version: 1 })).toBe(`part.${slug}-v1.tuned.gcode`);
});
