import { type QueryClient, useQueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import { events, type Job } from "#shared/contract/jobs.ts";
import { isUnderWay, jobQuery } from "#src/features/jobs/queries.ts";
import { urlOf } from "#src/lib/call.ts";

/** The browser mends a broken line by itself, but gives up when it is turned away, as when a session has ended. */
const AGAIN_MS = 10_000;

/** Listens to the team's jobs for as long as a page is open. */
export function useJobEvents(): void {
  const client = useQueryClient();
  useEffect(() => {
    if (typeof EventSource === "undefined") return;
    let source: EventSource;
    let timer: ReturnType<typeof setTimeout>;
    const open = () => {
      source = new EventSource(urlOf(events, {}));
      source.addEventListener("job", (event) => noteJob(client, JSON.parse(event.data) as Job));
      source.addEventListener("error", () => {
        if (source.readyState === EventSource.CLOSED) timer = setTimeout(open, AGAIN_MS);
      });
    };
    open();
    return () => {
      clearTimeout(timer);
      source.close();
    };
  }, [client]);
}

/** A job that has begun or ended changes what the lists and its own reading or tuning say. */
export function noteJob(client: QueryClient, job: Job): void {
  const before = client.getQueryData(jobQuery(job.id).queryKey);
  client.setQueryData(jobQuery(job.id).queryKey, job);
  if (before !== undefined && isUnderWay(before) === isUnderWay(job)) return;
  client.invalidateQueries({ queryKey: ["toolpaths"] });
  client.invalidateQueries({ queryKey: ["readings", job.readingId] });
  client.invalidateQueries({ queryKey: ["tunings"] });
}
