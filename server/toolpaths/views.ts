import type { ReadingRow, ToolpathRow } from "#server/toolpaths/queries.ts";
import type { Reading, Toolpath } from "#shared/contract/toolpaths.ts";

export function readingView({ reading, machineName, job }: ReadingRow): Reading {
  return {
    id: reading.id,
    toolpathId: reading.toolpathId,
    machineId: reading.machineId,
    machineVersion: reading.machineVersion,
    machineName,
    state: job.state,
    jobId: job.id,
    createdAt: reading.createdAt.toISOString(),
    ...(job.refusal === null ? {} : { refusal: job.refusal }),
    ...(reading.summary === null ? {} : { summary: reading.summary }),
  };
}

export function toolpathView({ toolpath, createdBy }: ToolpathRow, readings: readonly ReadingRow[]): Toolpath {
  const { id, name, sha256, bytes, createdAt } = toolpath;
  const own = readings.filter(({ reading }) => reading.toolpathId === id);
  return { id, name, sha256, bytes, createdAt: createdAt.toISOString(), createdBy, readings: own.map(readingView) };
}
