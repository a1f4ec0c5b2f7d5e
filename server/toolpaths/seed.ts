import { createReadStream } from "node:fs";
import { join } from "node:path";
import { whenEnded } from "#server/jobs/when-ended.ts";
import { machines } from "#server/machines/service.ts";
import type { Parts } from "#server/parts.ts";
import { profiles } from "#server/profiles/service.ts";
import { ROOT } from "#server/root.ts";
import * as toolpaths from "#server/toolpaths/service.ts";
import { toolpathStream } from "#server/toolpaths/toolpath-stream.ts";
import * as tunings from "#server/tunings/service.ts";
import type { Reading } from "#shared/contract/toolpaths.ts";

/** The demo's parts, each with the machine it is for; the one to be tuned comes last, and is listed first. */
const PARTS = [
  ["valve-plate.gcode", "Tern"],
  ["mast-bracket.gcode", "Tern"],
  ["sensor-cap.gcode", "Fulmar"],
  ["seal-ring.gcode", "Tern"],
] as const;
const PROFILE = "Seal ring, stiff base and tough lip";
const MEGABYTE = 2 ** 20;

/**
 * Gives a team that has the sample documents the sample toolpaths, as if they had been uploaded, and one tuning. What is
 * there already is left as it is; the tuning comes last and can't be removed, so that with it nothing is left to do.
 */
export async function seedToolpaths(parts: Parts, operator: toolpaths.Uploader): Promise<void> {
  const { db, workshop } = parts;
  if (await tunings.hasAny(db, operator.teamId)) return;
  let reading: Reading | undefined;
  for (const [fileName, machineName] of PARTS)
    reading = await seedToolpath(
      parts,
      operator,
      fileName,
      await named(machines.storedNamed(db, operator.teamId, machineName)),
    );
  if (!reading) return;
  await whenEnded(db, workshop, operator.teamId, reading.jobId);
  const profile = await named(profiles.storedNamed(db, operator.teamId, PROFILE));
  const request = { readingId: reading.id, profileId: profile.id, profileVersion: profile.number };
  await tunings.create(db, workshop, { ...operator, role: "operator" }, request);
}

async function seedToolpath(
  { db, env, workshop }: Parts,
  operator: toolpaths.Uploader,
  name: string,
  machine: Awaited<ReturnType<typeof machines.stored>>,
): Promise<Reading> {
  const there = (await toolpaths.list(db, operator.teamId)).find((toolpath) => toolpath.name === name);
  if (there)
    return toolpaths.readAgain(db, workshop, operator, there.id, {
      machineId: machine.id,
      machineVersion: machine.number,
    });
  const bytes = createReadStream(join(ROOT, "samples", name));
  const stream = toolpathStream(bytes, name, machine.document, env.MAX_UPLOAD_MB * MEGABYTE);
  const staged = await workshop.shelf.storage.stage(stream, "seed");
  const { reading } = await toolpaths.store(db, workshop, operator, machine, { name, staged });
  return reading;
}

async function named<Version>(found: Promise<Version | undefined>): Promise<Version> {
  const version = await found;
  if (version === undefined) throw new Error("the demo's documents are not those of samples/");
  return version;
}
