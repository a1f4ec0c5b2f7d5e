import { readFileSync } from "node:fs";
import { setTimeout as wait } from "node:timers/promises";
import type { Role } from "#shared/contract/roles.ts";
import type { Reading, Toolpath } from "#shared/contract/toolpaths.ts";
import type { Tuning } from "#shared/contract/tunings.ts";
import type { TeamName, TestServer } from "#tests/helpers/server.ts";

export const SAMPLES = {
  "mast-bracket": ["tern", "mast-bracket-stiff-throughout"],
  "valve-plate": ["tern", "valve-plate-flat-and-stiff"],
  "seal-ring": ["tern", "seal-ring-stiff-base-and-tough-lip"],
  "sensor-cap": ["fulmar", "sensor-cap-clear-dome"],
} as const;
export type SampleName = keyof typeof SAMPLES;

export const samplePath = (path: string): string => new URL(`../../samples/${path}`, import.meta.url).pathname;
export const sampleBytes = (name: SampleName): Buffer => readFileSync(samplePath(`${name}.gcode`));
export const sampleJson = (path: string): unknown => JSON.parse(readFileSync(samplePath(path), "utf8"));

/** Ended one way or another. */
const ENDED = ["done", "refused", "failed", "cancelled"];

/** Asks again and again until it is so. */
export async function eventually<Value>(
  look: () => Promise<Value>,
  isSo: (value: Value) => boolean,
  withinMs = 45_000,
): Promise<Value> {
  const until = Date.now() + withinMs;
  for (;;) {
    const value = await look();
    if (isSo(value)) return value;
    if (Date.now() > until) throw new Error(`this never came about: ${JSON.stringify(value)}`);
    await wait(25);
  }
}

/** A team's machine, made by its engineer. */
export async function addMachine(server: TestServer, name = "tern", team: TeamName = "alder"): Promise<string> {
  const document = sampleJson(`machines/${name}.json`);
  const { body } = await server.as("engineer", team).post("/api/machines").send({ document }).expect(201);
  return body.id;
}

export async function addProfile(server: TestServer, name: string, team: TeamName = "alder"): Promise<string> {
  const document = sampleJson(`profiles/${name}.json`);
  const { body } = await server.as("engineer", team).post("/api/profiles").send({ document }).expect(201);
  return body.id;
}

export const upload = (
  server: TestServer,
  machine: string,
  bytes: Buffer,
  name = "part.gcode",
  role: Role = "operator",
) => server.as(role).post(`/api/toolpaths?machine=${machine}`).attach("file", bytes, name);

/** A toolpath of the team Alder and its reading, once that has ended. */
export async function uploadAndRead(
  server: TestServer,
  machine: string,
  bytes: Buffer,
  name = "part.gcode",
): Promise<{ toolpath: Toolpath; reading: Reading }> {
  const { body } = await upload(server, machine, bytes, name).expect(201);
  return { toolpath: body.toolpath, reading: await endedReading(server, body.reading.id) };
}

export function endedReading(server: TestServer, id: string): Promise<Reading> {
  return eventually<Reading>(
    async () => (await server.as("viewer").get(`/api/readings/${id}`).expect(200)).body,
    ({ state }) => ENDED.includes(state),
  );
}

export function endedTuning(server: TestServer, id: string): Promise<Tuning> {
  return eventually<Tuning>(
    async () => (await server.as("viewer").get(`/api/tunings/${id}`).expect(200)).body,
    ({ state }) => ENDED.includes(state),
  );
}

/** The engineer's tuning of a sample, once it has ended. */
export async function tuneSample(
  server: TestServer,
  name: SampleName,
  bytes = sampleBytes(name),
): Promise<{ machine: string; reading: Reading; tuning: Tuning }> {
  const [machineName, profileName] = SAMPLES[name];
  const machine = await addMachine(server, machineName);
  const { reading } = await uploadAndRead(server, machine, bytes, `${name}.gcode`);
  const profileId = await addProfile(server, profileName);
  const request = { readingId: reading.id, profileId, profileVersion: 1 };
  const { body } = await server.as("engineer").post("/api/tunings").send(request).expect(201);
  return { machine, reading, tuning: await endedTuning(server, body.id) };
}

export async function acknowledgeMachine(server: TestServer, role: Role, machine: string): Promise<void> {
  const { SAFETY_CHECKLIST } = await import("#shared/contract/safety-checklist.ts");
  const checklist = SAFETY_CHECKLIST.map(({ id }) => id);
  await server.as(role).put(`/api/machines/${machine}/versions/1/acknowledgement`).send({ checklist }).expect(200);
}
