import type { JobRow } from "#server/jobs/queries.ts";
import type { TaskProgress } from "#server/jobs/tasks.ts";
import type { Job } from "#shared/contract/jobs.ts";

/** A job as clients see it. @param live progress that is newer than the row's */
export function jobView(row: JobRow, live?: TaskProgress): Job {
  const { bytes, layers } = live ?? row;
  return {
    id: row.id,
    kind: row.kind,
    state: row.state,
    progress: {
      bytes: Math.min(bytes, row.ofBytes),
      ofBytes: row.ofBytes,
      ...(layers === null || layers === undefined ? {} : { layers }),
    },
    ...row.subject,
    ...(row.refusal === null ? {} : { refusal: row.refusal }),
    createdAt: row.createdAt.toISOString(),
    ...(row.endedAt === null ? {} : { endedAt: row.endedAt.toISOString() }),
  };
}
