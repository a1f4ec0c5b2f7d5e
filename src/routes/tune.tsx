import { useQuery } from "@tanstack/react-query";
import { useParams } from "react-router-dom";
import type { Reading } from "#shared/contract/toolpaths.ts";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { JobProgress } from "#src/features/jobs/job-progress.tsx";
import { isUnderWay } from "#src/features/jobs/queries.ts";
import { readingQuery, toolpathQuery } from "#src/features/toolpaths/queries.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { MachineChoice } from "#src/routes/machine-choice.tsx";
import { type Choice, ProfileChoice, useProfileChoice } from "#src/routes/profile-choice.tsx";
import { TuneDesk } from "#src/routes/tune-desk.tsx";
import { ButtonLink } from "#src/ui/button.tsx";
import { Notice } from "#src/ui/notice.tsx";
import { RefusalNotice } from "#src/ui/refusal-notice.tsx";
import { PageHead, Section } from "#src/ui/section.tsx";
import { Empty, Loaded } from "#src/ui/states.tsx";

/** Where a tuning is made: machine, profile, what will happen, and the button that writes the file. */
export function TunePage() {
  const { id = "" } = useParams();
  const reading = useQuery(readingQuery(id));
  return (
    <Loaded query={reading} what="Looking for the reading">
      {(found) => <Tune key={found.id} reading={found} />}
    </Loaded>
  );
}

function Tune({ reading }: { reading: Reading }) {
  const toolpath = useQuery(toolpathQuery(reading.toolpathId));
  const name = toolpath.data?.name ?? "Toolpath";
  usePageTitle(`Tune ${name}`);
  const choice = useProfileChoice(reading);
  return (
    <>
      <PageHead
        kind="Tune"
        title={name}
        actions={<ButtonLink to={paths.toolpath(reading.toolpathId, reading.id)}>Back to the toolpath</ButtonLink>}
      />
      <Section title="With" note="what it is written for">
        <div className="grid gap-4 sm:grid-cols-2 lg:grid-cols-[14rem_minmax(0,1fr)_14rem] max-lg:[&>:nth-child(2)]:order-3 max-lg:[&>:nth-child(2)]:col-span-full">
          <MachineChoice reading={reading} />
          <ProfileChoice {...choice} machine={{ id: reading.machineId, name: reading.machineName }} />
        </div>
      </Section>
      <Ready reading={reading} choice={choice} />
    </>
  );
}

function Ready({ reading, choice }: { reading: Reading; choice: Choice }) {
  const may = useMay();
  const { state, jobId, machineName, refusal } = reading;
  if (isUnderWay(reading)) {
    return (
      <Section title="Reading">
        <JobProgress jobId={jobId} label={`for ${machineName}`} mayCancel={may("operate")} />
      </Section>
    );
  }
  if (state !== "done") return <RefusalNotice title={`Not read for ${machineName}`} refusal={refusal} />;
  if (!may("operate")) {
    return (
      <Notice kind="note" title="Tuning is for operators and engineers">
        Your role may look at what they wrote.
      </Notice>
    );
  }
  if (choice.profileId === "") return <Empty>Choose a profile: it says what each layer shall become.</Empty>;
  if (choice.version === undefined) return null;
  return (
    <TuneDesk
      key={`${choice.profileId} ${choice.version}`}
      reading={reading}
      profile={{ id: choice.profileId, version: choice.version }}
    />
  );
}
