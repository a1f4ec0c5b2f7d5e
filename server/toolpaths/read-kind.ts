import type { JobKind } from "#server/jobs/job-kind.ts";
import { machines } from "#server/machines/service.ts";
import * as queries from "#server/toolpaths/queries.ts";

/** The job that reads a toolpath. */
export const readKind: JobKind<"read"> = {
  async task(db, { teamId, subject }) {
    const row = await queries.findReading(db, teamId, subject.readingId);
    if (!row) throw new Error(`the reading ${subject.readingId} of a job is not there`);
    const { toolpath, reading } = row;
    const machine = await machines.stored(db, teamId, reading.machineId, reading.machineVersion);
    return {
      kind: "read",
      file: { sha256: toolpath.sha256, bytes: toolpath.bytes },
      machine: machine.document,
    };
  },

  staged: ({ reading, document, table, places }) => [reading, document, table, places],

  async done(tx, { subject }, { summary, reading, document, table, places }) {
    await queries.updateReading(tx, subject.readingId, {
      summary,
      readingSha256: reading.sha256,
      documentSha256: document.sha256,
      tableSha256: table.sha256,
      placesSha256: places.sha256,
    });
  },

  /** A file that no reading has accepted is no toolpath, so its bytes are not kept. */
  async refused(tx, { id, teamId, subject }) {
    const others = (await queries.listReadings(tx, [subject.toolpathId])).filter(({ job }) => job.id !== id);
    if (others.some(({ job }) => ["queued", "running", "done"].includes(job.state))) return [];
    await queries.markRefused(tx, subject.toolpathId);
    const row = await queries.findToolpath(tx, teamId, subject.toolpathId);
    return row ? [row.toolpath.sha256] : [];
  },
};
