import { version } from "#server/cli/version.ts";
import type { Db } from "#server/db/client.ts";
import type { Actor } from "#server/http/actor.ts";
import { AppError, notFound } from "#server/http/app-error.ts";
import type { Workshop } from "#server/jobs/workshop.ts";
import { hasAcknowledged } from "#server/machines/acknowledgements.ts";
import { machines } from "#server/machines/service.ts";
import { polymers } from "#server/polymers/service.ts";
import { profiles } from "#server/profiles/service.ts";
import { doneReading } from "#server/toolpaths/service.ts";
import * as queries from "#server/tunings/queries.ts";
import { tuningView } from "#server/tunings/views.ts";
import { may } from "#shared/contract/roles.ts";
import type { Tuning } from "#shared/contract/tunings.ts";
import { checkFit } from "#shared/formats/fit.ts";

export type Tuner = Pick<Actor, "userId" | "teamId" | "role">;

export interface TuningRequest {
  readingId: string;
  profileId: string;
  profileVersion: number;
}

export async function list(db: Db, caller: Tuner): Promise<Tuning[]> {
  const rows = await queries.listTunings(db, caller.teamId);
  const known = new Map<string, boolean>();
  for (const { reading } of rows) {
    const key = versionKey(reading);
    if (!known.has(key)) known.set(key, await acknowledges(db, caller, reading));
  }
  return rows.map((row) => tuningView(row, known.get(versionKey(row.reading)) === true));
}

export function hasAny(db: Db, teamId: string): Promise<boolean> {
  return queries.hasTunings(db, teamId);
}

/** @throws AppError `not-found`, here and below also for what belongs to another team */
export async function get(db: Db, caller: Tuner, id: string): Promise<Tuning> {
  const row = await findTuning(db, caller.teamId, id);
  return tuningView(row, await acknowledges(db, caller, row.reading));
}

/**
 * Applies a profile version to a reading. Equal work that waits, runs or is done is answered instead.
 *
 * @throws AppError `version-not-approved`, `not-ready`; Refusal when machine, profile and polymer don't fit
 */
export async function create(db: Db, workshop: Workshop, tuner: Tuner, request: TuningRequest): Promise<Tuning> {
  const { teamId } = tuner;
  const { reading, toolpath } = await doneReading(db, teamId, request.readingId);
  const profile = await profiles.stored(db, teamId, request.profileId, request.profileVersion);
  if (!profile.approved && !may(tuner.role, "edit")) throw notApproved(profile.document.name, profile.number);
  const machine = await machines.stored(db, teamId, reading.machineId, reading.machineVersion);
  const polymer = await polymers.storedNamed(db, teamId, profile.document.polymer);
  checkFit(machine.document, profile.document, polymer?.document);
  const status = profile.approved ? "approved" : "trial-only";
  const tuningId = crypto.randomUUID();
  const { job, isNew } = await db.transaction(async (tx) => {
    const enqueued = await workshop.queue.enqueue(tx, {
      id: crypto.randomUUID(),
      teamId,
      kind: "tune",
      key: ["tune", reading.id, profile.id, profile.number, polymer?.id, polymer?.number, status, version].join(" "),
      subject: { toolpathId: toolpath.id, readingId: reading.id, tuningId },
      ofBytes: 2 * toolpath.bytes,
    });
    if (enqueued.isNew)
      await queries.insertTuning(tx, {
        id: tuningId,
        teamId,
        readingId: reading.id,
        profileId: profile.id,
        profileVersion: profile.number,
        polymerId: polymer?.id,
        polymerVersion: polymer?.number,
        status,
        engine: version,
        jobId: enqueued.job.id,
        createdBy: tuner.userId,
      });
    return enqueued;
  });
  if (isNew) workshop.announce(job);
  return get(db, tuner, job.subject.tuningId!);
}

export type DoneTuning = queries.TuningRow & {
  files: Record<"planSha256" | "proofSha256" | "changesSha256" | "placesSha256" | "editsSha256", string>;
};

/** A tuning whose job is done, whatever its proof says. @throws AppError `not-ready` */
export async function doneTuning(db: Db, teamId: string, id: string): Promise<DoneTuning> {
  const row = await findTuning(db, teamId, id);
  const { planSha256, proofSha256, changesSha256, placesSha256, editsSha256 } = row.tuning;
  if (!planSha256 || !proofSha256 || !changesSha256 || !placesSha256 || !editsSha256)
    throw new AppError("not-ready", `The tuning is ${row.job.state}.`, {
      remedy: "Wait until it is done, or see why it ended.",
    });
  return { ...row, files: { planSha256, proofSha256, changesSha256, placesSha256, editsSha256 } };
}

/** Digest of the tuned bytes. @throws AppError `proof-failed`: then there are none */
export function tunedBytesOf({ tuning }: DoneTuning): string {
  if (tuning.tunedSha256 !== null) return tuning.tunedSha256;
  throw new AppError("proof-failed", "The proof of this tuning failed, so its file was not kept.", {
    remedy: "See the proof for what did not hold, and tell whoever runs this server.",
  });
}

/** The file may leave the server once its taker knows the machine's dangers. @throws AppError `acknowledge-first` */
export async function downloadable(db: Db, caller: Tuner, id: string): Promise<{ sha256: string; fileName: string }> {
  const row = await doneTuning(db, caller.teamId, id);
  const sha256 = tunedBytesOf(row);
  if (!(await acknowledges(db, caller, row.reading)))
    throw new AppError(
      "acknowledge-first",
      `You have not acknowledged the cautions of ${row.machineName}, version ${row.reading.machineVersion}.`,
      { remedy: "Go through the checklist on the machine's page, then download again." },
    );
  return { sha256, fileName: tuningView(row, true).fileName };
}

async function findTuning(db: Db, teamId: string, id: string): Promise<queries.TuningRow> {
  const row = await queries.findTuning(db, teamId, id);
  if (!row) throw notFound("tuning");
  return row;
}

type MachineVersion = Pick<queries.TuningRow["reading"], "machineId" | "machineVersion">;

const versionKey = ({ machineId, machineVersion }: MachineVersion): string => `${machineId} ${machineVersion}`;

const acknowledges = (db: Db, { userId }: Tuner, { machineId, machineVersion }: MachineVersion): Promise<boolean> =>
  hasAcknowledged(db, { userId, machineId, machineVersion });

function notApproved(name: string, number: number): AppError {
  return new AppError("version-not-approved", `Version ${number} of "${name}" is not approved.`, {
    remedy: "Take an approved version, or ask an engineer to make a trial with this one.",
  });
}
