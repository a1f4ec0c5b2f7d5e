import { beforeAll, describe, expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parseReading } from "#shared/formats/reading.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import { readingDocument } from "#shared/layers/reading-document.ts";
import { testServer } from "#tests/helpers/server.ts";
import {
  addMachine,
  addProfile,
  endedReading,
  endedTuning,
  SAMPLES,
  type SampleName,
  sampleBytes,
  sampleJson,
  uploadAndRead,
} from "#tests/helpers/workshop.ts";

const server = testServer({ WORKERS: "2" });
beforeAll(() => server.parts.workshop.start());
const get = (path: string) => server.as("viewer").get(path);

describe.each(Object.keys(SAMPLES) as SampleName[])("the sample %s", (name) => {
  test("reads as the engine reads it, and its layers can be looked at", async () => {
    const [machineName] = SAMPLES[name];
    const bytes = sampleBytes(name);
    const { toolpath, reading } = await uploadAndRead(server, await addMachine(server, machineName), bytes);
    expect(reading.state).toBe("done");
    const document = parseReading((await get(`/api/readings/${reading.id}/document`).expect(200)).body);
    expect(document).toEqual(readHere(bytes, machineName, toolpath.sha256));
    expect(reading.summary).toMatchObject({ layers: document.layers.length, lines: document.file.lines });

    const { text, headers } = await get(`/api/readings/${reading.id}/layers.csv`).expect(200);
    expect(headers["content-type"]).toContain("text/csv");
    const rows = text.trimEnd().split("\r\n");
    expect(rows).toHaveLength(document.layers.length + 1);
    expect(rows[1].split(",")[0]).toBe("1");

    // Laid end to end, the layers are the file from the first layer on.
    let joined = "";
    for (let layer = 1; layer <= Math.min(document.layers.length, 20); layer++) {
      const { body } = await get(`/api/readings/${reading.id}/lines?layer=${layer}`).expect(200);
      if (body.truncated) return;
      joined += body.text;
    }
    expect(bytes.toString("utf8")).toContain(joined);
    await get(`/api/readings/${reading.id}/lines?layer=${document.layers.length + 1}`).expect(404);
  });
});

function readHere(bytes: Buffer, machineName: string, sha256: string) {
  const reader = new ToolpathReader(parseMachine(sampleJson(`machines/${machineName}.json`)));
  reader.push(bytes);
  return JSON.parse(JSON.stringify(readingDocument(reader.end(sha256))));
}

test("a layer that is too long is cut at a line's end", async () => {
  const walls = Array.from({ length: 20_000 }, (_, k) => `G1 X${k % 200} Y${k % 3} E${(k * 0.1).toFixed(2)} F1800`);
  const file = Buffer.from(`M82\nG0 Z0.2\n${walls.join("\n")}\nG0 Z9\n`);
  const { reading } = await uploadAndRead(server, await addMachine(server), file);
  const { body } = await get(`/api/readings/${reading.id}/lines?layer=1`).expect(200);
  expect(body.truncated).toBe(true);
  expect(body.text.length).toBeGreaterThan(199_000);
  expect(body.text.length).toBeLessThanOrEqual(200_000);
  expect(body.text.endsWith("F1800\n")).toBe(true);
});

test("an equal reading is answered with the one that is there; another version of the machine is read anew", async () => {
  const machine = await addMachine(server);
  const { toolpath, reading } = await uploadAndRead(server, machine, sampleBytes("seal-ring"));
  const readings = `/api/toolpaths/${toolpath.id}/readings`;
  const same = { machineId: machine, machineVersion: 1 };
  expect((await server.as("operator").post(readings).send(same).expect(201)).body.id).toBe(reading.id);
  await server.as("operator").post(readings).send({ machineId: machine, machineVersion: 2 }).expect(404);
  const document = sampleJson("machines/tern.json");
  await server.as("engineer").post(`/api/machines/${machine}/versions`).send({ basedOn: 1, document }).expect(201);
  const { body } = await server
    .as("operator")
    .post(readings)
    .send({ machineId: machine, machineVersion: 2 })
    .expect(201);
  expect(body.id).not.toBe(reading.id);
  expect((await endedReading(server, body.id)).state).toBe("done");
  expect((await get(`/api/toolpaths/${toolpath.id}`).expect(200)).body.readings).toHaveLength(2);
});

test("removing a toolpath removes its bytes, unless another toolpath has the same", async () => {
  const machine = await addMachine(server);
  const [first, second] = [
    await uploadAndRead(server, machine, sampleBytes("seal-ring"), "one.gcode"),
    await uploadAndRead(server, machine, sampleBytes("seal-ring"), "two.gcode"),
  ];
  const { storage } = server.parts.workshop.shelf;
  await server.as("viewer").delete(`/api/toolpaths/${first.toolpath.id}`).expect(403);
  await server.as("operator").delete(`/api/toolpaths/${first.toolpath.id}`).expect(204);
  await get(`/api/toolpaths/${first.toolpath.id}`).expect(404);
  await get(`/api/readings/${first.reading.id}`).expect(404);
  await get(`/api/readings/${second.reading.id}/document`).expect(200);
  expect(await storage.has(second.toolpath.sha256)).toBe(true);
  await server.as("operator").delete(`/api/toolpaths/${second.toolpath.id}`).expect(204);
  expect(await storage.has(second.toolpath.sha256)).toBe(false);
});

test("a toolpath that was tuned is part of the record and stays", async () => {
  const { toolpath, reading } = await uploadAndRead(server, await addMachine(server), sampleBytes("seal-ring"));
  const profileId = await addProfile(server, "seal-ring-stiff-base-and-tough-lip");
  const request = { readingId: reading.id, profileId, profileVersion: 1 };
  const { body } = await server.as("engineer").post("/api/tunings").send(request).expect(201);
  await endedTuning(server, body.id);
  const refused = await server.as("operator").delete(`/api/toolpaths/${toolpath.id}`).expect(409);
  expect(refused.body.code).toBe("in-use");
});

test("another team finds none of it", async () => {
  const machine = await addMachine(server);
  const { toolpath, reading } = await uploadAndRead(server, machine, sampleBytes("seal-ring"));
  const stranger = server.as("lead", "birch");
  expect((await stranger.get("/api/toolpaths").expect(200)).body).toEqual([]);
  await stranger.get(`/api/toolpaths/${toolpath.id}`).expect(404);
  await stranger.delete(`/api/toolpaths/${toolpath.id}`).expect(404);
  const again = { machineId: machine, machineVersion: 1 };
  await stranger.post(`/api/toolpaths/${toolpath.id}/readings`).send(again).expect(404);
  for (const path of ["", "/document", "/layers.csv", "/lines?layer=1"]) {
    await stranger.get(`/api/readings/${reading.id}${path}`).expect(404);
    await server.with().get(`/api/readings/${reading.id}${path}`).expect(401);
  }
  await stranger.get(`/api/jobs/${reading.jobId}`).expect(404);
  await stranger.delete(`/api/jobs/${reading.jobId}`).expect(404);
});
