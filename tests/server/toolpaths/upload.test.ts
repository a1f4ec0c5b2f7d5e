import { readdir } from "node:fs/promises";
import { type ClientRequest, request as httpRequest } from "node:http";
import { type AddressInfo, connect } from "node:net";
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { gzipSync } from "node:zlib";
import { beforeAll, beforeEach, expect, test } from "vitest";
import { testServer } from "#tests/helpers/server.ts";
import { addMachine, endedReading, eventually, sampleBytes, upload, uploadAndRead } from "#tests/helpers/workshop.ts";

const server = testServer({ WORKERS: "1", MAX_UPLOAD_MB: "4" });
let machine: string;
beforeAll(() => server.parts.workshop.start());
beforeEach(async () => {
  machine = await addMachine(server);
  // Files of the tests before: their rows are gone.
  await server.parts.workshop.shelf.sweep();
});

async function storedFiles(): Promise<string[]> {
  const all = await readdir(join(server.parts.env.DATA_DIR, "files"), { recursive: true, withFileTypes: true });
  return all.filter((file) => file.isFile()).map(({ name }) => name);
}
const toolpaths = async () => (await server.as("viewer").get("/api/toolpaths").expect(200)).body;
async function expectNothingStored(): Promise<void> {
  expect(await toolpaths()).toEqual([]);
  expect(await storedFiles()).toEqual([]);
}
const moves = (count: number): string =>
  Array.from({ length: count }, (_, k) => `G1 X${k % 100} Y${k % 7} F1800`).join("\n");

test("a packed file is the same toolpath as the plain one", async () => {
  const bytes = sampleBytes("seal-ring");
  const packed = await uploadAndRead(server, machine, gzipSync(bytes), "ring.gcode.gz");
  const plain = await uploadAndRead(server, machine, bytes, "ring.gcode");
  expect(packed.toolpath).toMatchObject({ name: "ring.gcode", bytes: bytes.length, sha256: plain.toolpath.sha256 });
  expect(packed.reading.state).toBe("done");
  expect(packed.reading.summary).toEqual(plain.reading.summary);
});

test.each([
  ["a picture", Buffer.from("\x89PNG\r\n\x1a\n000000", "latin1"), "not-gcode"],
  ["an archive", Buffer.from("PK\x03\x04000000000000", "latin1"), "not-gcode"],
  ["a large binary file", Buffer.alloc(300_000), "not-gcode"],
  ["an empty file", Buffer.alloc(0), "empty"],
  ["gzip of nothing", gzipSync(""), "empty"],
  ["a small file that extrudes nothing", Buffer.from(moves(50)), "no-extrusion"],
  ["a wrong checksum at its beginning", Buffer.from(`N1 G28*18\nN2 G1 X1*98\n${moves(50)}`), "checksum"],
  ["gzip that breaks off", gzipSync(sampleBytes("seal-ring")).subarray(0, 5_000), "broken-gzip"],
])("%s is refused with the reader's reason, and nothing is stored", async (_, bytes, code) => {
  const { body } = await upload(server, machine, bytes, "part.gcode").expect(422);
  expect(body).toMatchObject({ code, detail: expect.any(String), remedy: expect.any(String) });
  await expectNothingStored();
});

test("what only reading it whole can refuse is refused by its reading, is not listed, and its bytes go", async () => {
  const { toolpath, reading } = await uploadAndRead(server, machine, Buffer.from(moves(20_000)));
  expect(reading).toMatchObject({ state: "refused", refusal: { code: "no-extrusion" } });
  const { body } = await server.as("viewer").get(`/api/toolpaths/${toolpath.id}`).expect(200);
  expect(body.readings[0].refusal.code).toBe("no-extrusion");
  await eventually(storedFiles, (files) => files.length === 0);
  await expectNothingStored();
  const again = { machineId: machine, machineVersion: 1 };
  await server.as("operator").post(`/api/toolpaths/${toolpath.id}/readings`).send(again).expect(404);
});

test("a file over the limit is refused, packed or not, and nothing is stored", async () => {
  const large = Buffer.alloc(5 * 2 ** 20, "G1 X1 Y1 E1\n");
  for (const bytes of [large, gzipSync(large)]) {
    const { body } = await upload(server, machine, bytes).expect(413);
    expect(body.detail).toContain("larger than 4 MiB");
  }
  await expectNothingStored();
});

test("a form without a file, with two, or with a file in another field is refused, and nothing is stored", async () => {
  const post = () => server.as("operator").post(`/api/toolpaths?machine=${machine}`);
  const part = sampleBytes("seal-ring").subarray(0, 20_000);
  await post().field("note", "x").expect(422);
  await post().attach("file", part, "a.gcode").attach("file", part, "b.gcode").expect(422);
  await post().attach("other", part, "a.gcode").expect(422);
  await post().send({ file: "text" }).expect(415);
  await expectNothingStored();
});

test.each([
  ["../../etc/part.gcode", "part.gcode"],
  ["C:\\prints\\Dichtring Größe 2.gcode", "Dichtring Größe 2.gcode"],
  ["a\u202eedocg.gcode", "aedocg.gcode"],
  ["\u202e", "toolpath.gcode"],
])("a file named %j is called %j", async (sent, name) => {
  const { body } = await upload(server, machine, sampleBytes("seal-ring"), sent).expect(201);
  expect(body.toolpath.name).toBe(name);
  await endedReading(server, body.reading.id);
});

test("an upload that breaks off leaves no file and no row", async () => {
  const listening = server.app.listen(0);
  try {
    const { port } = listening.address() as AddressInfo;
    for (const sent of [100, 70_000, 400_000]) {
      const request = beginUpload(port, server.person("operator").cookie, machine);
      request.write(sampleBytes("seal-ring").subarray(0, sent));
      await wait(150);
      request.destroy();
    }
    await eventually(storedFiles, (files) => files.length === 0);
    await expectNothingStored();
    expect(server.logged.filter((line) => line.includes("a request failed"))).toEqual([]);
  } finally {
    listening.close();
  }
});

function beginUpload(port: number, cookie: string, machineId: string): ClientRequest {
  const headers = { cookie, "content-type": "multipart/form-data; boundary=b", "content-length": "5000000" };
  const request = httpRequest({ port, path: `/api/toolpaths?machine=${machineId}`, method: "POST", headers });
  request.on("error", () => {});
  request.write('--b\r\nContent-Disposition: form-data; name="file"; filename="part.gcode"\r\n\r\n');
  return request;
}

test("viewers, strangers and people who are signed out upload nothing", async () => {
  const bytes = sampleBytes("seal-ring");
  await upload(server, machine, bytes, "a.gcode", "viewer").expect(403);
  await server.with().post(`/api/toolpaths?machine=${machine}`).attach("file", bytes, "a.gcode").expect(401);
  await server
    .as("lead", "birch")
    .post(`/api/toolpaths?machine=${machine}`)
    .attach("file", bytes, "a.gcode")
    .expect(404);
  await server.as("operator").post("/api/toolpaths").attach("file", bytes, "a.gcode").expect(422);
  await expectNothingStored();
});

test.each([
  ["somebody who is signed out", () => undefined, 401],
  ["a viewer", () => server.person("viewer").cookie, 403],
])("a large upload by %s is answered at once, and cut off when it goes on", async (_, cookie, status) => {
  const listening = server.app.listen(0);
  const { port } = listening.address() as AddressInfo;
  try {
    const { reply, sentBytes } = await sendUntilClosed(port, cookie());
    expect(reply).toMatch(new RegExp(`^HTTP/1.1 ${status} `));
    expect(sentBytes.atReply).toBeLessThan(LARGE_BYTES / 10);
    expect(sentBytes.atEnd).toBeLessThan(LARGE_BYTES / 2);
    await expectNothingStored();
  } finally {
    listening.close();
  }
});

const LARGE_BYTES = 200e6;

/** Sends a large body piece by piece, at some 13 MB/s, until it has gone out or the connection is closed. */
async function sendUntilClosed(port: number, cookie?: string) {
  const socket = connect(port, "127.0.0.1");
  const head = [
    `POST /api/toolpaths?machine=${machine} HTTP/1.1`,
    "Host: localhost",
    "Content-Type: multipart/form-data; boundary=b",
    `Content-Length: ${LARGE_BYTES}`,
    ...(cookie === undefined ? [] : [`Cookie: ${cookie}`]),
  ];
  const piece = Buffer.alloc(262_144, "G1 X1\n");
  const sentBytes = { atReply: Number.POSITIVE_INFINITY, atEnd: 0 };
  let reply = "";
  socket.on("data", (text) => {
    if (reply === "") sentBytes.atReply = sentBytes.atEnd;
    reply += text;
  });
  // Cutting with bytes on their way looks like a broken connection from here.
  socket.on("error", () => {});
  socket.write(`${head.join("\r\n")}\r\n\r\n`);
  while (!socket.destroyed && sentBytes.atEnd < LARGE_BYTES) {
    socket.write(piece);
    sentBytes.atEnd += piece.length;
    await wait(20);
  }
  socket.destroy();
  return { reply, sentBytes };
}
