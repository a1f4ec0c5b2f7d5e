import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useNavigate, useParams, useSearchParams } from "react-router-dom";
import type { Reading } from "#shared/contract/toolpaths.ts";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { documentsQuery, historyQuery, MACHINES, PROFILES } from "#src/features/documents/kinds.ts";
import { JobProgress } from "#src/features/jobs/job-progress.tsx";
import { isUnderWay } from "#src/features/jobs/queries.ts";
import { readAgain, readingQuery, toolpathQuery } from "#src/features/toolpaths/queries.ts";
import { tuningsQuery } from "#src/features/tunings/queries.ts";
import { asProblem } from "#src/lib/problem.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { TuneDesk } from "#src/routes/tune-desk.tsx";
import { ButtonLink } from "#src/ui/button.tsx";
import { SelectField } from "#src/ui/field.tsx";
import { Notice, ProblemNotice } from "#src/ui/notice.tsx";
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
        <div className="grid gap-4 md:grid-cols-[14rem_minmax(0,1fr)_14rem]">
          <MachineChoice reading={reading} />
          <ProfileChoice {...choice} />
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

/** Layer times depend on the machine: another one means another reading. */
function MachineChoice({ reading }: { reading: Reading }) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const machines = useQuery(documentsQuery(MACHINES));
  const change = useMutation({
    mutationFn: (machineId: string) =>
      readAgain(reading.toolpathId, machineId, machines.data?.find(({ id }) => id === machineId)?.latest.number ?? 1),
    onSuccess: ({ id }) => {
      client.invalidateQueries({ queryKey: ["toolpaths"] });
      navigate(`${paths.tune(id)}?${search}`, { replace: true });
    },
  });
  const latest = machines.data?.find(({ id }) => id === reading.machineId)?.latest.number;
  return (
    <div>
      <SelectField
        label="Machine"
        value={reading.machineId}
        disabled={change.isPending}
        hint={
          latest !== undefined && latest > reading.machineVersion
            ? `Read with version ${reading.machineVersion}; ${latest} is the latest.`
            : `Read with version ${reading.machineVersion}.`
        }
        onChange={({ target }) => change.mutate(target.value)}
      >
        {(machines.data ?? [{ id: reading.machineId, name: reading.machineName }]).map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </SelectField>
      {change.error && <ProblemNotice problem={asProblem(change.error)} />}
    </div>
  );
}

interface Choice {
  profileId: string;
  /** undefined until a profile is chosen and its versions are known */
  version: number | undefined;
  choose(profileId: string, version?: number): void;
}

/** The choice stands in the address. To begin with: what this toolpath was tuned with last. */
function useProfileChoice(reading: Reading): Choice {
  const may = useMay();
  const [search, setSearch] = useSearchParams();
  const tunings = useQuery(tuningsQuery);
  const last = tunings.data?.find(({ toolpathId }) => toolpathId === reading.toolpathId);
  const profileId = search.get("profile") ?? last?.profileId ?? "";
  const history = useQuery({ ...historyQuery(PROFILES, profileId), enabled: profileId !== "" });
  const usable = (history.data?.versions ?? []).filter(({ approvedAt }) => may("edit") || approvedAt !== undefined);
  const wanted = Number(search.get("version"));
  return {
    profileId,
    version: usable.find(({ number }) => number === wanted)?.number ?? usable[0]?.number,
    choose: (profile, version) => {
      const next = new URLSearchParams(search);
      next.set("profile", profile);
      if (version === undefined) next.delete("version");
      else next.set("version", String(version));
      setSearch(next, { replace: true, preventScrollReset: true });
    },
  };
}

function ProfileChoice({ profileId, version, choose }: Choice) {
  const may = useMay();
  const profiles = useQuery(documentsQuery(PROFILES));
  const history = useQuery({ ...historyQuery(PROFILES, profileId), enabled: profileId !== "" });
  // Approved ones first: they are what parts that ship are made with.
  const sorted = [...(profiles.data ?? [])].sort((a, b) => Number(isApproved(b)) - Number(isApproved(a)));
  const offered = may("edit") ? sorted : sorted.filter(isApproved);
  const versions = (history.data?.versions ?? []).filter(({ approvedAt }) => may("edit") || approvedAt !== undefined);
  const chosen = versions.find(({ number }) => number === version);
  return (
    <>
      <SelectField
        label="Profile"
        value={profileId}
        hint={
          offered.length === 0 && profiles.data ? "No profile is approved yet. Ask the lead of your team." : undefined
        }
        onChange={({ target }) => choose(target.value)}
      >
        {profileId === "" && <option value="">Choose …</option>}
        {offered.map((profile) => (
          <option key={profile.id} value={profile.id}>
            {profile.name}
            {isApproved(profile) ? "" : " (not approved)"}
          </option>
        ))}
      </SelectField>
      <SelectField
        label="Version"
        value={version ?? ""}
        disabled={versions.length === 0}
        hint={chosen && (chosen.approvedAt ? "Approved." : "Not approved: for trials only.")}
        onChange={({ target }) => choose(profileId, Number(target.value))}
      >
        {versions.map(({ number, approvedAt }) => (
          <option key={number} value={number}>
            {number}
            {approvedAt ? ", approved" : ""}
          </option>
        ))}
      </SelectField>
    </>
  );
}

const isApproved = ({ approved = [] }: { approved?: number[] }): boolean => approved.length > 0;
