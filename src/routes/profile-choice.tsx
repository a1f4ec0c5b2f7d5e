import { useQuery } from "@tanstack/react-query";
import { useSearchParams } from "react-router-dom";
import type { Reading } from "#shared/contract/toolpaths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { documentsQuery, historyQuery, PROFILES } from "#src/features/documents/kinds.ts";
import { tuningsQuery } from "#src/features/tunings/queries.ts";
import { SelectField } from "#src/ui/field.tsx";

export interface Choice {
  profileId: string;
  /** undefined until a profile is chosen and its versions are known */
  version: number | undefined;
  choose(profileId: string, version?: number): void;
}

/** The choice stands in the address. To begin with: what this toolpath was tuned with last. */
export function useProfileChoice(reading: Reading): Choice {
  const [search, setSearch] = useSearchParams();
  const tunings = useQuery(tuningsQuery);
  const last = tunings.data?.find(({ toolpathId }) => toolpathId === reading.toolpathId);
  const profileId = search.get("profile") ?? last?.profileId ?? "";
  const version = useVersionChoice(profileId, Number(search.get("version")));
  return {
    profileId,
    version,
    choose: (profile, version) => {
      const next = new URLSearchParams(search);
      next.set("profile", profile);
      if (version === undefined) next.delete("version");
      else next.set("version", String(version));
      setSearch(next, { replace: true, preventScrollReset: true });
    },
  };
}

/** The wanted version, or else the latest that this person may use; undefined until the versions are known. */
export function useVersionChoice(profileId: string, wanted: number): number | undefined {
  const may = useMay();
  const history = useQuery({ ...historyQuery(PROFILES, profileId), enabled: profileId !== "" });
  const usable = (history.data?.versions ?? []).filter(({ approvedAt }) => may("edit") || approvedAt !== undefined);
  return usable.find(({ number }) => number === wanted)?.number ?? usable[0]?.number;
}

export function ProfileChoice({ profileId, version, choose }: Choice) {
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
