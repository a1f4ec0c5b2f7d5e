import type { JobKind } from "#server/jobs/job-kind.ts";
import { machines } from "#server/machines/service.ts";
import { polymers } from "#server/polymers/service.ts";
import { profiles } from "#server/profiles/service.ts";
import * as queries from "#server/tunings/queries.ts";

/** The job that tunes a toolpath. */
export const tuneKind: JobKind<"tune"> = {
  async task(db, { teamId, subject }) {
    const row = subject.tuningId && (await queries.findTuning(db, teamId, subject.tuningId));
    if (!row) throw new Error(`the tuning ${subject.tuningId} of a job is not there`);
    const { tuning, reading, toolpath } = row;
    if (reading.readingSha256 === null) throw new Error(`the reading ${reading.id} of a tuning is not done`);
    const machine = await machines.stored(db, teamId, reading.machineId, reading.machineVersion);
    const profile = await profiles.stored(db, teamId, tuning.profileId, tuning.profileVersion);
    const polymer =
      tuning.polymerId === null || tuning.polymerVersion === null
        ? undefined
        : await polymers.stored(db, teamId, tuning.polymerId, tuning.polymerVersion);
    return {
      kind: "tune",
      file: { sha256: toolpath.sha256, bytes: toolpath.bytes },
      reading: reading.readingSha256,
      machine: { ...machine.document, version: machine.number },
      profile: { ...profile.document, version: profile.number },
      polymer: polymer?.document,
      status: tuning.status,
    };
  },

  staged: ({ tuned, plan, proof, changes, places, edits }) => [
    ...(tuned ? [tuned] : []),
    plan,
    proof,
    changes,
    places,
    edits,
  ],

  async done(tx, { subject }, { tuned, plan, proof, changes, places, edits, planned, proven }) {
    await queries.updateTuning(tx, subject.tuningId!, {
      planned,
      proven,
      tunedSha256: tuned?.sha256,
      tunedBytes: tuned?.bytes,
      planSha256: plan.sha256,
      proofSha256: proof.sha256,
      changesSha256: changes.sha256,
      placesSha256: places.sha256,
      editsSha256: edits.sha256,
    });
  },
};
