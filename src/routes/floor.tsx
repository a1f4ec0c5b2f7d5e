import { useQuery } from "@tanstack/react-query";
import { useNavigate } from "react-router-dom";
import { paths } from "#src/app/paths.ts";
import { useMay, useSession } from "#src/features/auth/session-context.tsx";
import { documentsQuery, MACHINES, PROFILES } from "#src/features/documents/kinds.ts";
import { JobProgress } from "#src/features/jobs/job-progress.tsx";
import { isUnderWay } from "#src/features/jobs/queries.ts";
import { BringIn } from "#src/features/toolpaths/bring-in.tsx";
import { toolpathsQuery } from "#src/features/toolpaths/queries.ts";
import { ToolpathTable } from "#src/features/toolpaths/toolpath-table.tsx";
import { tuningsQuery } from "#src/features/tunings/queries.ts";
import { TuningTable } from "#src/features/tunings/tuning-table.tsx";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { isWritten, nextStep, waitingItems } from "#src/routes/floor-waiting.ts";
import { WaitingList } from "#src/routes/floor-waiting-list.tsx";
import { ButtonLink } from "#src/ui/button.tsx";
import { PageHead, Section } from "#src/ui/section.tsx";
import { Empty, Loaded } from "#src/ui/states.tsx";

const RECENT = 12;

/** What is going on: what is to be done, what is under way, what came in last. */
export function Floor() {
  usePageTitle("Floor");
  const navigate = useNavigate();
  const may = useMay();
  const { user } = useSession();
  const machines = useQuery(documentsQuery(MACHINES));
  const profiles = useQuery(documentsQuery(PROFILES));
  const toolpaths = useQuery(toolpathsQuery);
  const tunings = useQuery(tuningsQuery);
  const items = waitingItems({ toolpaths: toolpaths.data, tunings: tunings.data, profiles: profiles.data, may });
  const underWay = [
    ...(toolpaths.data ?? []).flatMap(({ name, readings }) =>
      readings
        .filter(isUnderWay)
        .map(({ jobId, machineName }) => ({ jobId, label: `Reading ${name} for ${machineName}` })),
    ),
    ...(tunings.data ?? []).filter(isUnderWay).map(({ jobId, fileName }) => ({ jobId, label: `Writing ${fileName}` })),
  ];
  return (
    <>
      <PageHead title="Floor" />
      {may("operate") && (
        <div className="pb-6">
          <Loaded query={machines} what="Looking for machines">
            {(list) =>
              list.length === 0 ? (
                <Empty
                  actions={
                    may("edit") && <ButtonLink to={paths.newDocument("machines")}>Describe a machine</ButtonLink>
                  }
                >
                  A toolpath is read for a machine, and there is none yet.
                  {!may("edit") && " Ask an engineer of your team to describe one."}
                </Empty>
              ) : (
                <BringIn
                  machines={list}
                  userId={user.id}
                  onArrived={({ toolpath, reading }, last) => last && navigate(paths.toolpath(toolpath.id, reading.id))}
                />
              )
            }
          </Loaded>
        </div>
      )}
      {underWay.length > 0 && (
        <Section title="Under way">
          <div className="flex flex-col gap-5">
            {underWay.map(({ jobId, label }) => (
              <JobProgress key={jobId} jobId={jobId} label={label} mayCancel={may("operate")} />
            ))}
          </div>
        </Section>
      )}
      <Section title="To do">
        {items.length > 0 ? <WaitingList items={items} /> : <p className="text-soft">Nothing for you to do.</p>}
      </Section>
      <Section title="Toolpaths" note="as sliced">
        <Loaded query={toolpaths} what="Looking for toolpaths">
          {(list) =>
            list.length === 0 ? (
              <Empty>No toolpath has come in yet.{may("operate") && " Drop one on this page."}</Empty>
            ) : (
              <ToolpathTable
                toolpaths={list.slice(0, RECENT)}
                hrefOf={({ id }) => paths.toolpath(id)}
                nextOf={(toolpath) => nextStep(toolpath, may)}
                tunedOf={({ id }) =>
                  (tunings.data ?? []).filter(isWritten).filter((one) => one.toolpathId === id).length
                }
              />
            )
          }
        </Loaded>
      </Section>
      <Section title="Tunings" note="written files">
        <Loaded query={tunings} what="Looking for tunings">
          {(list) =>
            list.length === 0 ? (
              <Empty>No tuned file has been written yet. Open a toolpath and tune it.</Empty>
            ) : (
              <TuningTable tunings={list.slice(0, RECENT)} hrefOf={({ id }) => paths.tuning(id)} />
            )
          }
        </Loaded>
      </Section>
    </>
  );
}
