import { useQuery } from "@tanstack/react-query";
import { useSearchParams } from "react-router-dom";
import type { DocumentSummary } from "#shared/contract/documents.ts";
import { lackingChannels, type MachineGist } from "#shared/contract/gists.ts";
import type { Reading } from "#shared/contract/toolpaths.ts";
import type { Tuning } from "#shared/contract/tunings.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { documentsQuery, historyQuery, MACHINES, PROFILES } from "#src/features/documents/kinds.ts";
import { tuningsQuery } from "#src/features/tunings/queries.ts";
import { moment } from "#src/lib/format.ts";
import { SelectField } from "#src/ui/field.tsx";

export interface Choice {
  profileId: string;
  /** undefined until a profile is chosen and its versions are known */
  version: number | undefined;
  /** the tuning that a profile nobody chose here was taken from */
  asIn?: Pick<Tuning, "createdBy" | "createdAt">;
  choose(profileId: string, version?: number): void;
}

/**
 * The choice stands in the address. To begin with: what this toolpath was tuned with last, as long as the machine can
 * drive it.
 */
export function useProfileChoice(reading: Reading): Choice {
  const [search, setSearch] = useSearchParams();
  const tunings = useQuery(tuningsQuery);
  const profiles = useQuery(documentsQuery(PROFILES));
  const machine = useMachineGist(reading.machineId);
  const fits = ({ profileId }: Tuning) => {
    const profile = profiles.data?.find(({ id }) => id === profileId);
    return profile !== undefined && machine !== undefined && canDrive(profile, machine);
  };
  const chosen = search.get("profile");
  const last = tunings.data?.find((tuning) => tuning.toolpathId === reading.toolpathId && fits(tuning));
  const profileId = chosen ?? last?.profileId ?? "";
  const version = useVersionChoice(profileId, Number(search.get("version")));
  return {
    profileId,
    version,
    asIn: chosen === null ? last : undefined,
    choose: (profile, version) => {
      const next = new URLSearchParams(search);
      next.set("profile", profile);
      if (version === undefined) next.delete("version");
      else next.set("version", String(version));
      setSearch(next, { replace: true, preventScrollReset: true });
    },
  };
}

/** Channels of a machine, as the list of machines has them. */
function useMachineGist(id: string): MachineGist | undefined {
  const machines = useQuery(documentsQuery(MACHINES));
  return machines.data?.find((each) => each.id === id)?.machine;
}

/** A profile of which nothing is known is given the benefit of the doubt. */
const canDrive = ({ profile }: DocumentSummary, machine: MachineGist): boolean =>
  profile === undefined || lackingChannels(profile, machine).length === 0;

/** The wanted version, or else the latest that this person may use; undefined until the versions are known. */
export function useVersionChoice(profileId: string, wanted: number): number | undefined {
  const may = useMay();
  const history = useQuery({ ...historyQuery(PROFILES, profileId), enabled: profileId !== "" });
  const usable = (history.data?.versions ?? []).filter(({ approvedAt }) => may("edit") || approvedAt !== undefined);
  return usable.find(({ number }) => number === wanted)?.number ?? usable[0]?.number;
}

interface Props extends Choice {
  machine: { id: string; name: string };
}

/** Profile and version, those first that the machine can drive. */
export function ProfileChoice({ profileId, version, asIn, choose, machine: { id: machineId, name } }: Props) {
  const may = useMay();
  const profiles = useQuery(documentsQuery(PROFILES));
  const history = useQuery({ ...historyQuery(PROFILES, profileId), enabled: profileId !== "" });
  const machine = useMachineGist(machineId);
  // Approved ones first: they are what parts that ship are made with.
  const sorted = [...(profiles.data ?? [])].sort((a, b) => Number(isApproved(b)) - Number(isApproved(a)));
  const offered = may("edit") ? sorted : sorted.filter(isApproved);
  const groups = [
    { label: `For ${name}`, profiles: offered.filter((each) => !machine || canDrive(each, machine)) },
    {
      label: `For channels that ${name} lacks`,
      profiles: offered.filter((each) => machine && !canDrive(each, machine)),
    },
  ];
  const versions = (history.data?.versions ?? []).filter(({ approvedAt }) => may("edit") || approvedAt !== undefined);
  const chosen = versions.find(({ number }) => number === version);
  return (
    <>
      <SelectField
        label="Profile"
        value={profileId}
        hint={
          offered.length === 0 && profiles.data
            ? "No profile is approved yet. Ask the lead of your team."
            : asIn && `As last time, by ${asIn.createdBy} on ${moment(asIn.createdAt)}.`
        }
        onChange={({ target }) => choose(target.value)}
      >
        {profileId === "" && <option value="">Choose …</option>}
        {groups
          .filter(({ profiles }) => profiles.length > 0)
          .map(({ label, profiles }) => (
            <optgroup key={label} label={label}>
              {profiles.map((profile) => (
                <option key={profile.id} value={profile.id}>
                  {optionText(profile)}
                </option>
              ))}
            </optgroup>
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

/** "PEEK: Seal ring, stiff base and tough lip (not approved)" */
function optionText(summary: DocumentSummary): string {
  const { name, profile } = summary;
  return `${profile ? `${profile.polymer}: ` : ""}${name}${isApproved(summary) ? "" : " (not approved)"}`;
}
