import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import type { Job } from "#shared/contract/jobs.ts";
import { isUnderWay, jobQuery, stopJob } from "#src/features/jobs/queries.ts";
import { noteJob } from "#src/features/jobs/use-job-events.ts";
import { bytes, counted } from "#src/lib/format.ts";
import { Progress } from "#src/ui/progress.tsx";
import { Failed } from "#src/ui/states.tsx";

interface Props {
  jobId: string;
  label: string;
  mayCancel: boolean;
}

/** How far a job has come: bytes, then layers. */
export function JobProgress({ jobId, label, mayCancel }: Props) {
  const client = useQueryClient();
  const { data: job, error, refetch } = useQuery(jobQuery(jobId));
  const cancel = useMutation({ mutationFn: () => stopJob(jobId), onSuccess: (stopped) => noteJob(client, stopped) });
  // Found out by asking rather than by an event: the pages that wait for its end must hear of it too.
  useEffect(() => {
    if (!job || isUnderWay(job)) return;
    client.invalidateQueries({ queryKey: ["toolpaths"] });
    client.invalidateQueries({ queryKey: ["readings", job.readingId] });
    client.invalidateQueries({ queryKey: ["tunings"] });
  }, [client, job]);
  if (error && !job) return <Failed error={error} retry={() => refetch()} />;
  return (
    <>
      <Progress
        label={label}
        share={job && shareOf(job)}
        detail={job ? jobDetail(job) : "…"}
        onCancel={mayCancel && job && isUnderWay(job) && !cancel.isPending ? () => cancel.mutate() : undefined}
      />
      {cancel.error && <Failed error={cancel.error} />}
    </>
  );
}

function shareOf({ progress, state }: Job): number | undefined {
  if (state === "queued") return undefined;
  return progress.ofBytes > 0 ? progress.bytes / progress.ofBytes : undefined;
}

function jobDetail({ state, progress }: Job): string {
  if (state === "queued") return "waits for its turn";
  const read = `${bytes(progress.bytes)} of ${bytes(progress.ofBytes)}`;
  return progress.layers ? `${read}, ${counted(progress.layers, "layer")}` : read;
}
