import { execFile } from "node:child_process";
import { createHash } from "node:crypto";
import { mkdtemp, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import { beforeAll, describe, expect, test } from "vitest";
import type { Tuning } from "#shared/contract/tunings.ts";
import { parsePlan } from "#shared/formats/plan.ts";
import { parseProof } from "#shared/formats/proof.ts";
import { samplePolymer } from "#tests/helpers/sample.ts";
import { testServer } from "#tests/helpers/server.ts";
import {
  acknowledgeMachine,
  addProfile,
  endedTuning,
  SAMPLES,
  type SampleName,
  sampleBytes,
  samplePath,
  tuneSample,
} from "#tests/helpers/workshop.ts";

const server = testServer({ WORKERS: "1" });
beforeAll(() => server.parts.workshop.start());

const run = promisify(execFile);
const text = (body: unknown): string => (body as Buffer).toString("latin1");
const rawGet = (role: "engineer" | "operator", path: string, headers: Record<string, string> = {}) =>
  server
    .as(role)
    .get(path)
    .set(headers)
    .buffer(true)
    .parse((response, done) => {
      const pieces: Buffer[] = [];
      response.on("data", (piece: Buffer) => pieces.push(piece));
      response.on("end", () => done(null, Buffer.concat(pieces)));
    });

describe.each(Object.keys(SAMPLES) as SampleName[])("the sample %s", (name) => {
  test("is tuned, proven, and downloaded whole and in parts", async () => {
    const { machine, tuning } = await tuneSample(server, name);
    expect(tuning).toMatchObject({ state: "done", status: "trial-only", proof: { passed: true }, acknowledged: false });
    const slug = tuning.profileName.toLowerCase().replaceAll(/[^a-z0-9]+/g, "-");
    expect(slug).not.toBe("");
    expect(tuning.fileName).toBe(`${name}.${slug}-v1.tuned.gcode`);
    const file = `/api/tunings/${tuning.id}/file`;
    const refused = await server.as("engineer").get(file).expect(409);
    expect(refused.body.code).toBe("acknowledge-first");

    await acknowledgeMachine(server, "engineer", machine);
    const { body, headers } = await rawGet("engineer", file).expect(200);
    const whole = body as Buffer;
    expect(createHash("sha256").update(whole).digest("hex")).toBe(tuning.tuned!.sha256);
    expect(headers["content-disposition"]).toContain(`filename="${tuning.fileName}"`);
    expect(headers.etag).toBe(`"${tuning.tuned!.sha256}"`);

    const part = await rawGet("engineer", file, { Range: "bytes=1000-4999", "If-Range": headers.etag }).expect(206);
    expect(part.headers["content-range"]).toBe(`bytes 1000-4999/${whole.length}`);
    expect((part.body as Buffer).equals(whole.subarray(1000, 5000))).toBe(true);
    const rest = await rawGet("engineer", file, { Range: `bytes=${whole.length - 10}-` }).expect(206);
    expect(text(rest.body)).toBe(text(whole.subarray(-10)));
    const suffix = await rawGet("engineer", file, { Range: "bytes=-7" }).expect(206);
    expect(text(suffix.body)).toBe(text(whole.subarray(-7)));
    const other = await rawGet("engineer", file, { Range: "bytes=0-9", "If-Range": '"other"' }).expect(200);
    expect((other.body as Buffer).length).toBe(whole.length);
    const beyond = await rawGet("engineer", file, { Range: `bytes=${whole.length}-` }).expect(416);
    expect(beyond.headers["content-range"]).toBe(`bytes */${whole.length}`);
    await rawGet("engineer", file, { "If-None-Match": headers.etag }).expect(304);

    const plan = parsePlan((await server.as("viewer").get(`/api/tunings/${tuning.id}/plan`).expect(200)).body);
    const proof = parseProof((await server.as("viewer").get(`/api/tunings/${tuning.id}/proof`).expect(200)).body);
    expect(proof.output).toEqual(tuning.tuned);
    expect(plan.layers).toHaveLength(tuning.plan!.layers);
    expect(whole.equals(await tunedByCommandLine(name, tuning))).toBe(true);
    await everyLayerDiffFits(tuning.id, sampleBytes(name), whole, plan.layers.length);
  }, 240_000);
});

/** What the command line makes of the same file with the same documents, which name their versions. */
async function tunedByCommandLine(name: SampleName, tuning: Tuning): Promise<Buffer> {
  const folder = await mkdtemp(join(tmpdir(), "quenchline-tuned-"));
  try {
    const out = join(folder, "out.gcode");
    const [machine, profile] = await Promise.all([
      documentFile(folder, "machines", tuning.machineId, tuning.machineVersion),
      documentFile(folder, "profiles", tuning.profileId, tuning.profileVersion),
    ]);
    const documents = ["--machine", machine, "--profile", profile];
    const program = samplePath("../server/cli/launch.mjs");
    await run(process.execPath, [program, "tune", samplePath(`${name}.gcode`), ...documents, "--out", out]);
    return await readFile(out);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

async function documentFile(folder: string, kind: string, id: string, version: number): Promise<string> {
  const { body } = await server.as("viewer").get(`/api/${kind}/${id}/versions/${version}`).expect(200);
  const path = join(folder, `${kind}.json`);
  await writeFile(path, JSON.stringify({ ...body.document, version }));
  return path;
}

const unnumbered = (lines: string): string => lines.replace(/^N\d+ |\*\d+/gm, "");
/** Lines as everybody counts them; the bytes of each with its terminator. */
const linesOf = (bytes: Buffer): string[] => bytes.toString("utf8").match(/[^\r\n]*(\r\n|\r|\n)|[^\r\n]+$/g) ?? [];

async function everyLayerDiffFits(id: string, original: Buffer, tuned: Buffer, layers: number): Promise<void> {
  const [theirs, ours] = [linesOf(original), linesOf(tuned)];
  const { body: changed } = await server.as("viewer").get(`/api/tunings/${id}/changes`).expect(200);
  const [step, differing] = [Math.max(1, Math.floor(layers / 12)), [] as number[]];
  for (let layer = 1; layer <= layers; layer += layer === layers ? 1 : Math.min(step, layers - layer)) {
    const { body } = await server.as("viewer").get(`/api/tunings/${id}/layers/${layer}/diff`).expect(200);
    expect(body.shows).toBe("layer");
    const [hunk] = body.hunks;
    for (const [side, lines] of [
      [hunk.original, theirs],
      [hunk.tuned, ours],
    ]) {
      const shown = linesOf(Buffer.from(side.text));
      expect(shown).toEqual(lines.slice(side.firstLine - 1, side.firstLine - 1 + shown.length));
    }
    if (unnumbered(hunk.original.text) !== unnumbered(hunk.tuned.text)) differing.push(layer);
    else expect(changed).not.toContain(layer);
  }
  for (const layer of differing) expect(changed).toContain(layer);
}

test("an operator tunes with approved versions only, and the file then says approved", async () => {
  const { reading, tuning } = await tuneSample(server, "seal-ring");
  const request = { readingId: reading.id, profileId: tuning.profileId, profileVersion: 1 };
  const refused = await server.as("operator").post("/api/tunings").send(request).expect(403);
  expect(refused.body.code).toBe("version-not-approved");
  await server.as("lead").post(`/api/profiles/${tuning.profileId}/versions/1/approval`).expect(200);
  const { body } = await server.as("operator").post("/api/tunings").send(request).expect(201);
  const approved = await endedTuning(server, body.id);
  expect(approved).toMatchObject({ state: "done", status: "approved", proof: { passed: true } });
  expect(approved.id).not.toBe(tuning.id);
  await acknowledgeMachine(server, "operator", tuning.machineId);
  const file = await rawGet("operator", `/api/tunings/${approved.id}/file`).expect(200);
  expect(text(file.body)).toMatch(/^;quenchline \{.*"status":"approved"/m);
  await server.as("viewer").post("/api/tunings").send(request).expect(403);
});

test("asking for the same tuning twice gives one tuning", async () => {
  const { reading, tuning } = await tuneSample(server, "seal-ring");
  const request = { readingId: reading.id, profileId: tuning.profileId, profileVersion: 1 };
  const again = await server.as("engineer").post("/api/tunings").send(request).expect(201);
  expect(again.body.id).toBe(tuning.id);
  expect((await server.as("viewer").get("/api/tunings").expect(200)).body).toHaveLength(1);
});

test("a tuning says with which version of the polymer's card it was made", async () => {
  const { reading, tuning } = await tuneSample(server, "seal-ring");
  expect(tuning.polymerId).toBeUndefined();
  const engineer = server.as("engineer");
  const card = await engineer.post("/api/polymers").send({ document: samplePolymer() }).expect(201);
  const request = { readingId: reading.id, profileId: tuning.profileId, profileVersion: 1 };
  const { body } = await engineer.post("/api/tunings").send(request).expect(201);
  expect(body).toMatchObject({ polymerId: card.body.id, polymerVersion: 1 });
  await endedTuning(server, body.id);
});

test("a profile that does not fit the machine is refused at once, with its reason", async () => {
  const { reading } = await tuneSample(server, "seal-ring");
  const profileId = await addProfile(server, "sensor-cap-clear-dome");
  const request = { readingId: reading.id, profileId, profileVersion: 1 };
  const { body } = await server.as("engineer").post("/api/tunings").send(request).expect(422);
  expect(body).toMatchObject({ title: "The input is not accepted", remedy: expect.any(String) });
});

test("another team finds no tuning, and nobody downloads signed out or as a viewer", async () => {
  const { tuning } = await tuneSample(server, "seal-ring");
  for (const path of ["", "/plan", "/proof", "/changes", "/layers/1/diff", "/file"]) {
    const { body } = await server.as("lead", "birch").get(`/api/tunings/${tuning.id}${path}`).expect(404);
    expect(body.code).toBe("not-found");
    await server.with().get(`/api/tunings/${tuning.id}${path}`).expect(401);
  }
  expect((await server.as("lead", "birch").get("/api/tunings").expect(200)).body).toEqual([]);
  await server.as("viewer").get(`/api/tunings/${tuning.id}/file`).expect(403);
  const request = { readingId: tuning.readingId, profileId: tuning.profileId, profileVersion: 1 };
  await server.as("lead", "birch").post("/api/tunings").send(request).expect(404);
});
