import { version } from "#server/cli/version.ts";
import type { Db } from "#server/db/client.ts";
import type { Actor } from "#server/http/actor.ts";
import { AppError, notFound } from "#server/http/app-error.ts";
import { type JobRow, removeJobs } from "#server/jobs/queries.ts";
import type { Workshop } from "#server/jobs/workshop.ts";
import { machines } from "#server/machines/service.ts";
import * as queries from "#server/toolpaths/queries.ts";
import type { Uploaded } from "#server/toolpaths/upload.ts";
import { readingView, toolpathView } from "#server/toolpaths/views.ts";
import type { Reading, Toolpath } from "#shared/contract/toolpaths.ts";

export type Uploader = Pick<Actor, "userId" | "teamId">;

/** Which version of which machine. */
interface MachineVersion {
  id: string;
  number: number;
}

export async function list(db: Db, teamId: string): Promise<Toolpath[]> {
  const rows = await queries.listToolpaths(db, teamId);
  const readings = await queries.listReadings(
    db,
    rows.map(({ toolpath }) => toolpath.id),
  );
  return rows.map((row) => toolpathView(row, readings));
}

/** @throws AppError `not-found`, here and below also for what belongs to another team */
export async function get(db: Db, teamId: string, id: string): Promise<Toolpath> {
  const row = await findToolpath(db, teamId, id);
  return toolpathView(row, await queries.listReadings(db, [id]));
}

export async function getReading(db: Db, teamId: string, id: string): Promise<Reading> {
  return readingView(await findReading(db, teamId, id));
}

/** Puts an upload in its place and has it read. */
export async function store(
  db: Db,
  workshop: Workshop,
  uploader: Uploader,
  machine: MachineVersion,
  { name, staged }: Uploaded,
): Promise<{ toolpath: Toolpath; reading: Reading }> {
  const { teamId, userId } = uploader;
  const { sha256, bytes } = staged;
  const toolpath = { id: crypto.randomUUID(), teamId, name, sha256, bytes, createdBy: userId };
  const { job, readingId } = await workshop.shelf.keep([staged], () =>
    db.transaction(async (tx) => {
      await queries.insertToolpath(tx, toolpath);
      return enqueueReading(tx, workshop, uploader, toolpath, machine);
    }),
  );
  workshop.announce(job);
  return { toolpath: await get(db, teamId, toolpath.id), reading: await getReading(db, teamId, readingId) };
}

/** @throws AppError `not-found` also for a version that the machine does not have */
export async function readAgain(
  db: Db,
  workshop: Workshop,
  reader: Uploader,
  toolpathId: string,
  { machineId, machineVersion }: { machineId: string; machineVersion: number },
): Promise<Reading> {
  const { toolpath } = await findToolpath(db, reader.teamId, toolpathId);
  if (toolpath.refusedAt !== null)
    throw new AppError("not-found", "This file was refused, so its bytes were not kept.", {
      remedy: "Upload it again.",
    });
  const machine = await machines.stored(db, reader.teamId, machineId, machineVersion);
  const { job, readingId, isNew } = await db.transaction((tx) =>
    enqueueReading(tx, workshop, reader, toolpath, machine),
  );
  if (isNew) workshop.announce(job);
  return getReading(db, reader.teamId, readingId);
}

/** @throws AppError `in-use` while a tuning was made from it */
export async function remove(db: Db, workshop: Workshop, teamId: string, id: string): Promise<void> {
  const { toolpath } = await findToolpath(db, teamId, id);
  const readings = await queries.listReadings(db, [id]);
  await refuseInUse(db, readings);
  for (const { job } of readings) await workshop.runner.cancel(job.id);
  // Read again: what was running may have ended with files of its own.
  const last = await db.transaction(async (tx) => {
    const rows = await queries.listReadings(tx, [id]);
    await refuseInUse(tx, rows);
    await queries.removeToolpath(tx, id);
    await removeJobs(
      tx,
      rows.map(({ job }) => job.id),
    );
    return rows;
  });
  const files = last.flatMap(({ reading }) => [
    reading.readingSha256,
    reading.documentSha256,
    reading.tableSha256,
    reading.placesSha256,
  ]);
  await workshop.shelf.release([toolpath.sha256, ...files.filter((sha256) => sha256 !== null)]);
}

/** A reading that is done. @throws AppError `not-ready` */
export async function doneReading(db: Db, teamId: string, id: string): Promise<DoneReading> {
  const row = await findReading(db, teamId, id);
  const { readingSha256, documentSha256, tableSha256, placesSha256 } = row.reading;
  if (!readingSha256 || !documentSha256 || !tableSha256 || !placesSha256)
    throw new AppError("not-ready", `The reading is ${row.job.state}.`, {
      remedy: "Wait until it is done, or see why it ended.",
    });
  return { ...row, files: { readingSha256, documentSha256, tableSha256, placesSha256 } };
}

export type DoneReading = queries.ReadingRow & { files: { [Name in keyof queries.ReadingFiles]-?: string } };

async function findToolpath(db: Db, teamId: string, id: string): Promise<queries.ToolpathRow> {
  const row = await queries.findToolpath(db, teamId, id);
  if (!row) throw notFound("toolpath");
  return row;
}

async function findReading(db: Db, teamId: string, id: string): Promise<queries.ReadingRow> {
  const row = await queries.findReading(db, teamId, id);
  if (!row) throw notFound("reading");
  return row;
}

async function refuseInUse(db: Db, readings: readonly queries.ReadingRow[]): Promise<void> {
  const tunings = await queries.countTunings(
    db,
    readings.map(({ reading }) => reading.id),
  );
  if (tunings === 0) return;
  const made = tunings === 1 ? "A tuning was" : `${tunings} tunings were`;
  throw new AppError("in-use", `${made} made from this toolpath, and it is part of their record.`);
}

/** An equal reading that waits, runs or is done is answered instead. */
async function enqueueReading(
  tx: Db,
  { queue }: Workshop,
  { teamId, userId }: Uploader,
  toolpath: { id: string; bytes: number },
  machine: MachineVersion,
): Promise<{ job: JobRow; readingId: string; isNew: boolean }> {
  const readingId = crypto.randomUUID();
  const { job, isNew } = await queue.enqueue(tx, {
    id: crypto.randomUUID(),
    teamId,
    kind: "read",
    key: ["read", toolpath.id, machine.id, machine.number, version].join(" "),
    subject: { toolpathId: toolpath.id, readingId },
    ofBytes: toolpath.bytes,
  });
  if (isNew)
    await queries.insertReading(tx, {
      id: readingId,
      toolpathId: toolpath.id,
      machineId: machine.id,
      machineVersion: machine.number,
      jobId: job.id,
      createdBy: userId,
    });
  return { job, readingId: job.subject.readingId, isNew };
}
