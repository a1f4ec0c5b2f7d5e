import { queryOptions } from "@tanstack/react-query";
import { cancelJob, getJob, type Job } from "#shared/contract/jobs.ts";
import { call } from "#src/lib/call.ts";

export const isUnderWay = ({ state }: { state: Job["state"] }): boolean => state === "queued" || state === "running";

/** Events keep it fresh; it is asked for now and then in case one was missed. */
export const jobQuery = (id: string) =>
  queryOptions({
    queryKey: ["jobs", id],
    queryFn: ({ signal }) => call(getJob, { params: { id }, signal }),
    refetchInterval: ({ state: { data } }) => (data === undefined || isUnderWay(data) ? 2_000 : false),
  });

export const stopJob = (id: string): Promise<Job> => call(cancelJob, { params: { id } });
