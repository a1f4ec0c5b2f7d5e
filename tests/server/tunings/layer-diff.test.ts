import { beforeAll, expect, test } from "vitest";
import { updateTuning } from "#server/tunings/queries.ts";
import { tunedName } from "#server/tunings/tuned-name.ts";
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

test.each(["plain", "crlf", "numbered"] as const)(
  "a layer too long to be sent whole, of a %s file, is sent as a stretch whose sides begin and end at the same lines",
  async (form) => {
    const { tuning, original, tuned } = await tuneLongLayers(form);
    for (let layer = 1; layer <= 4; layer++) {
      const { body } = await server.as("viewer").get(`/api/tunings/${tuning.id}/layers/${layer}/diff`).expect(200);
      expect(body.truncated).toBe(true);
      const [left, right] = [linesOf(body.original.text), linesOf(body.tuned.text)];
      const [from, tunedFrom] = [body.original.firstLine - 1, body.tuned.firstLine - 1];
      expect(left.length).toBeGreaterThan(4_000);
      expect(left).toEqual(original.slice(from, from + left.length));
      expect(right).toEqual(tuned.slice(tunedFrom, tunedFrom + right.length));
      // The file's own fan command far inside is gone on the right; what lies behind it is the same, to the end.
      expect(left.join("")).toContain(`M106 S${100 + layer}`);
      expect(right.join("")).not.toContain(`M106 S${100 + layer}`);
      expect(left.slice(-500).map(unnumbered)).toEqual(right.slice(-500).map(unnumbered));
    }
  },
);

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
  ["part.gcode", "part.tuned.gcode"],
  ["part.v2.g", "part.v2.tuned.g"],
  ["part.tuned.gcode", "part.tuned.gcode"],
  ["part", "part.tuned.gcode"],
  [".gcode", ".gcode.tuned.gcode"],
])("the tuned file of %s is called %s", (original, name) => {
  expect(tunedName(original)).toBe(name);
});
