import type { TuningRow } from "#server/tunings/queries.ts";
import { tunedName } from "#server/tunings/tuned-name.ts";
import type { Tuning } from "#shared/contract/tunings.ts";

/** @param acknowledged the caller has acknowledged the cautions of this version of the machine */
export function tuningView(row: TuningRow, acknowledged: boolean): Tuning {
  const { tuning, reading, toolpath, job } = row;
  const { tunedSha256, tunedBytes, planned, proven } = tuning;
  return {
    id: tuning.id,
    readingId: reading.id,
    toolpathId: toolpath.id,
    toolpathName: toolpath.name,
    machineId: reading.machineId,
    machineVersion: reading.machineVersion,
    machineName: row.machineName,
    profileId: tuning.profileId,
    profileVersion: tuning.profileVersion,
    profileName: row.profileName,
    ...(tuning.polymerId === null || tuning.polymerVersion === null
      ? {}
      : { polymerId: tuning.polymerId, polymerVersion: tuning.polymerVersion }),
    status: tuning.status,
    state: job.state,
    jobId: job.id,
    createdAt: tuning.createdAt.toISOString(),
    createdBy: row.createdBy,
    original: { sha256: toolpath.sha256, bytes: toolpath.bytes },
    ...(reading.summary?.outline && { outline: reading.summary.outline }),
    ...(job.refusal === null ? {} : { refusal: job.refusal }),
    ...(tunedSha256 === null || tunedBytes === null ? {} : { tuned: { sha256: tunedSha256, bytes: tunedBytes } }),
    ...(planned === null ? {} : { plan: planned }),
    ...(proven === null ? {} : { proof: proven }),
    fileName: tunedName(toolpath.name, { name: row.profileName, version: tuning.profileVersion }),
    acknowledged,
  };
}
