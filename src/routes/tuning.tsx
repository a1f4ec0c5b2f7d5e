import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import { useParams } from "react-router-dom";
import { downloadTunedFile, type Tuning } from "#shared/contract/tunings.ts";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { JobProgress } from "#src/features/jobs/job-progress.tsx";
import { isUnderWay } from "#src/features/jobs/queries.ts";
import { ChecklistDialog } from "#src/features/machines/checklist-dialog.tsx";
import { tuningQuery } from "#src/features/tunings/queries.ts";
import { urlOf } from "#src/lib/call.ts";
import { bytes, moment } from "#src/lib/format.ts";
import { fetchFile } from "#src/lib/save-file.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { TunedView } from "#src/routes/tuned-view.tsx";
import { Button, ButtonLink, FileLink } from "#src/ui/button.tsx";
import { Notice } from "#src/ui/notice.tsx";
import { RefusalNotice } from "#src/ui/refusal-notice.tsx";
import { PageHead, Section } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

export function TuningPage() {
  const { id = "" } = useParams();
  const query = useQuery(tuningQuery(id));
  usePageTitle(query.data?.fileName ?? "Tuning");
  return (
    <Loaded query={query} what="Looking for the tuning">
      {(tuning) => <OneTuning tuning={tuning} />}
    </Loaded>
  );
}

function OneTuning({ tuning }: { tuning: Tuning }) {
  const may = useMay();
  const { fileName, profileName, profileVersion, machineName, machineVersion, status, createdBy, createdAt } = tuning;
  const again = `${paths.tune(tuning.readingId)}?profile=${tuning.profileId}&version=${profileVersion}`;
  return (
    <>
      <PageHead
        kind={status === "approved" ? "Tuning, with an approved profile" : "Tuning, for trials only"}
        title={fileName}
        note={
          <>
            {profileName}, version {profileVersion}, on {machineName}, version {machineVersion}; by {createdBy} on{" "}
            <span className="font-mono">{moment(createdAt)}</span>
          </>
        }
        actions={
          <>
            <ButtonLink to={paths.toolpath(tuning.toolpathId, tuning.readingId)}>Toolpath</ButtonLink>
            {may("operate") && <ButtonLink to={again}>Tune again</ButtonLink>}
            {may("operate") && tuning.state === "done" && <Download tuning={tuning} />}
          </>
        }
      />
      <TuningState tuning={tuning} mayOperate={may("operate")} />
    </>
  );
}

function TuningState({ tuning, mayOperate }: { tuning: Tuning; mayOperate: boolean }) {
  const { jobId, state, refusal, readingId, profileId, profileVersion } = tuning;
  if (isUnderWay(tuning)) {
    return (
      <Section title="Writing">
        <JobProgress jobId={jobId} label="Written, then proved" mayCancel={mayOperate} />
      </Section>
    );
  }
  if (state === "done") return <TunedView key={tuning.id} tuning={tuning} />;
  if (state === "cancelled") {
    return (
      <Notice kind="note" title="The tuning was given up">
        No file was written. Tune again to go on.
      </Notice>
    );
  }
  const change = `${paths.tune(readingId)}?profile=${profileId}&version=${profileVersion}`;
  return (
    <RefusalNotice
      title="Not written"
      refusal={refusal}
      actions={<ButtonLink to={change}>Change it and tune again</ButtonLink>}
    />
  );
}

/** The first download for a machine leads through its checklist. */
function Download({ tuning }: { tuning: Tuning }) {
  const { id, acknowledged, machineId, machineVersion, machineName, tuned, fileName } = tuning;
  const [open, setOpen] = useState(false);
  const machine = useMemo(
    () => ({ id: machineId, version: machineVersion, name: machineName }),
    [machineId, machineVersion, machineName],
  );
  if (acknowledged) {
    return (
      <FileLink weight="main" href={urlOf(downloadTunedFile, { id })} download={fileName}>
        Download {tuned && <span className="font-mono text-small font-normal">{bytes(tuned.bytes)}</span>}
      </FileLink>
    );
  }
  return (
    <>
      <Button weight="main" onClick={() => setOpen(true)}>
        Download …
      </Button>
      {open && (
        <ChecklistDialog
          machine={machine}
          action="I have made sure: download"
          onAcknowledged={() => {
            setOpen(false);
            fetchFile(urlOf(downloadTunedFile, { id }), fileName);
          }}
          onClose={() => setOpen(false)}
        />
      )}
    </>
  );
}
