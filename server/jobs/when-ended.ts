import type { Db } from "#server/db/client.ts";
import * as service from "#server/jobs/service.ts";
import type { Workshop } from "#server/jobs/workshop.ts";
import type { Job } from "#shared/contract/jobs.ts";

/** Waits for a job to end, one way or another. */
export async function whenEnded(db: Db, workshop: Workshop, teamId: string, id: string): Promise<Job> {
  let stop = (): void => {};
  const told = new Promise<Job>((resolve) => {
    stop = workshop.events.listen(teamId, (job) => {
      if (job.id === id && hasEnded(job)) resolve(job);
    });
  });
  try {
    // It may have ended before anybody listened.
    const job = await service.get(db, workshop, teamId, id);
    return hasEnded(job) ? job : await told;
  } finally {
    stop();
  }
}

const hasEnded = ({ state }: Job): boolean => state !== "queued" && state !== "running";
