import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { useNavigate, useParams, useSearchParams } from "react-router-dom";
import { getLayersCsv, type Reading, type Toolpath } from "#shared/contract/toolpaths.ts";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { documentsQuery, MACHINES } from "#src/features/documents/kinds.ts";
import { JobProgress } from "#src/features/jobs/job-progress.tsx";
import { isUnderWay } from "#src/features/jobs/queries.ts";
import { removeToolpath, toolpathQuery } from "#src/features/toolpaths/queries.ts";
import { ReadAgainDialog } from "#src/features/toolpaths/read-again-dialog.tsx";
import { tuningsQuery } from "#src/features/tunings/queries.ts";
import { TuningTable } from "#src/features/tunings/tuning-table.tsx";
import { urlOf } from "#src/lib/call.ts";
import { bytes, moment } from "#src/lib/format.ts";
import { asProblem } from "#src/lib/problem.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { ReadingView } from "#src/routes/reading-view.tsx";
import { Button, ButtonLink, FileLink } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { SelectField } from "#src/ui/field.tsx";
import { Notice, ProblemNotice } from "#src/ui/notice.tsx";
import { RefusalNotice } from "#src/ui/refusal-notice.tsx";
import { PageHead, Section } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

export function ToolpathPage() {
  const { id = "" } = useParams();
  const query = useQuery(toolpathQuery(id));
  usePageTitle(query.data?.name ?? "Toolpath");
  return (
    <Loaded query={query} what="Looking for the toolpath">
      {(toolpath) => <OneToolpath toolpath={toolpath} />}
    </Loaded>
  );
}

function OneToolpath({ toolpath }: { toolpath: Toolpath }) {
  const { id, name, readings } = toolpath;
  const may = useMay();
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const [dialog, setDialog] = useState<"read" | "remove">();
  const machines = useQuery(documentsQuery(MACHINES));
  const tunings = useQuery(tuningsQuery);
  const reading = readings.find((one) => one.id === search.get("reading")) ?? readings[0];
  const tuned = (tunings.data ?? []).filter(({ toolpathId }) => toolpathId === id);
  const show = ({ id: readingId }: Reading) => navigate(paths.toolpath(id, readingId));
  return (
    <>
      <PageHead
        kind="Toolpath"
        title={name}
        note={
          <>
            <span className="font-mono">{bytes(toolpath.bytes)}</span>, brought in by {toolpath.createdBy} on{" "}
            <span className="font-mono">{moment(toolpath.createdAt)}</span>
          </>
        }
        actions={
          <>
            {readings.length > 1 && (
              <SelectField
                label="Read for"
                value={reading?.id}
                onChange={({ target }) => navigate(paths.toolpath(id, target.value))}
              >
                {readings.map(({ id, machineName, machineVersion }) => (
                  <option key={id} value={id}>
                    {machineName}, version {machineVersion}
                  </option>
                ))}
              </SelectField>
            )}
            {reading?.state === "done" && (
              <FileLink href={urlOf(getLayersCsv, { id: reading.id })}>Layers as CSV</FileLink>
            )}
            {may("operate") && (
              <>
                <Button onClick={() => setDialog("read")} disabled={!machines.data?.length}>
                  Read for another machine
                </Button>
                <Button onClick={() => setDialog("remove")}>Remove</Button>
                {reading?.state === "done" && (
                  <ButtonLink weight="main" to={paths.tune(reading.id)}>
                    Tune
                  </ButtonLink>
                )}
              </>
            )}
          </>
        }
      />
      {reading && <ReadingState reading={reading} mayOperate={may("operate")} />}
      {tuned.length > 0 && (
        <Section title="Tunings" note="written from this toolpath">
          <TuningTable tunings={tuned} hrefOf={({ id }) => paths.tuning(id)} />
        </Section>
      )}
      {dialog === "read" && machines.data && (
        <ReadAgainDialog
          toolpathId={id}
          machines={machines.data}
          current={reading?.machineId}
          onClose={() => setDialog(undefined)}
          onRead={(read) => {
            setDialog(undefined);
            show(read);
          }}
        />
      )}
      {dialog === "remove" && <RemoveDialog toolpath={toolpath} onClose={() => setDialog(undefined)} />}
    </>
  );
}

function ReadingState({ reading, mayOperate }: { reading: Reading; mayOperate: boolean }) {
  const { id, jobId, state, machineName, machineVersion, refusal } = reading;
  if (isUnderWay(reading)) {
    return (
      <Section title="Reading">
        <JobProgress jobId={jobId} label={`for ${machineName}, version ${machineVersion}`} mayCancel={mayOperate} />
      </Section>
    );
  }
  if (state === "done") return <ReadingView key={id} reading={reading} />;
  if (state === "cancelled") {
    return (
      <Notice kind="note" title="The reading was given up">
        Read the toolpath again to go on.
      </Notice>
    );
  }
  return <RefusalNotice title={`Not read for ${machineName}`} refusal={refusal} />;
}

function RemoveDialog({ toolpath, onClose }: { toolpath: Toolpath; onClose(): void }) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const remove = useMutation({
    mutationFn: () => removeToolpath(toolpath.id),
    onSuccess: () => {
      client.removeQueries({ queryKey: ["toolpaths", toolpath.id] });
      client.invalidateQueries({ queryKey: ["toolpaths"], exact: true });
      navigate(paths.floor, { replace: true });
    },
  });
  return (
    <Dialog title="Remove the toolpath" onClose={onClose}>
      <p>
        <span className="font-semibold wrap-anywhere">{toolpath.name}</span> and its readings are removed for the whole
        team. A toolpath from which a tuned file was written stays.
      </p>
      {remove.error && <ProblemNotice problem={asProblem(remove.error)} />}
      <Actions>
        <Button weight="main" disabled={remove.isPending} onClick={() => remove.mutate()}>
          Remove
        </Button>
        <Button onClick={onClose}>Keep</Button>
      </Actions>
    </Dialog>
  );
}
