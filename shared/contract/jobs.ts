import { z } from "zod";
import { Count, Id, Instant, RefusalReport } from "#shared/contract/common.ts";
import { endpoint } from "#shared/contract/endpoint.ts";

/** `refused`: the input was not accepted, and the refusal says why. `failed`: a fault of ours. */
export const JobState = z.enum(["queued", "running", "done", "refused", "failed", "cancelled"]);
export type JobState = z.infer<typeof JobState>;

export const Job = z.object({
  id: Id,
  kind: z.enum(["read", "tune"]),
  state: JobState,
  /** bytes are those of the unpacked original; a tuning passes over it twice */
  progress: z.object({ bytes: Count, ofBytes: Count, layers: Count.optional() }),
  toolpathId: Id,
  readingId: Id,
  tuningId: Id.optional(),
  refusal: RefusalReport.optional(),
  createdAt: Instant,
  endedAt: Instant.optional(),
});
export type Job = z.infer<typeof Job>;

export const getJob = endpoint({ method: "GET", path: "/api/jobs/:id", allows: "read", reply: Job });

/** A job that has ended already stays as it is. */
export const cancelJob = endpoint({ method: "DELETE", path: "/api/jobs/:id", allows: "operate", reply: Job });

/** Server-sent events of the team: `event: job`, data a `Job`. */
export const events = endpoint({ method: "GET", path: "/api/events", allows: "read", reply: "stream" });
