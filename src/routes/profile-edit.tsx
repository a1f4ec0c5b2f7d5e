import { useQueries, useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { Profile, Rule } from "#shared/formats/profile.ts";
import { documentsQuery, MACHINES, PROFILES, versionQuery } from "#src/features/documents/kinds.ts";
import { ProfileEditor } from "#src/features/profiles/editor/profile-editor.tsx";
import { newProfile } from "#src/features/profiles/new-profile.ts";
import { EditPage, NewPage } from "#src/routes/edit-page.tsx";
import { usePolymerOf } from "#src/routes/use-polymers.ts";
import { SelectField } from "#src/ui/field.tsx";

interface EditorProps {
  profile: Profile;
  onChange(profile: Profile): void;
}

/** A profile by itself. It is checked against the machine it is meant for, where one is chosen. */
function Editor({ profile, onChange }: EditorProps) {
  const machines = useMachines();
  const [machineId, setMachineId] = useState<string>();
  const [driven] = useState(() => new Set(rulesOf(profile).map(({ channel }) => channel)));
  // To begin with: the machine that has the channels which the profile drives.
  const chosen =
    machines.find(({ id }) => id === machineId) ??
    machines.find(({ document }) => [...driven].every((channel) => document.channels.some(({ id }) => id === channel)));
  const { polymer, names } = usePolymerOf(profile.polymer);
  return (
    <>
      <SelectField
        label="For the machine"
        className="mb-5 max-w-xs"
        hint="Its channels can be driven, and its limits hold."
        value={machineId ?? chosen?.id ?? ""}
        onChange={({ target }) => setMachineId(target.value)}
      >
        {machines.map(({ id, document }) => (
          <option key={id} value={id}>
            {document.name}
          </option>
        ))}
        <option value="">no machine</option>
      </SelectField>
      <ProfileEditor
        profile={profile}
        onChange={onChange}
        machine={machineId === "" ? undefined : chosen?.document}
        polymer={polymer}
        polymers={names}
      />
    </>
  );
}

/** The latest version of each of the team's machines. */
function useMachines() {
  const list = useQuery(documentsQuery(MACHINES));
  const versions = useQueries({
    queries: (list.data ?? []).map(({ id, latest }) => versionQuery(MACHINES, id, latest.number)),
  });
  return versions.flatMap(({ data }) => data ?? []);
}

const rulesOf = ({ zones }: Profile): Rule[] => zones.flatMap(({ cooling, heating }) => [...cooling, ...heating]);

const editor = (profile: Profile, onChange: (profile: Profile) => void) => (
  <Editor profile={profile} onChange={onChange} />
);

export const EditProfile = () => <EditPage kind={PROFILES} editor={editor} />;
export const NewProfile = () => <NewPage kind={PROFILES} start={() => newProfile("PEEK")} editor={editor} />;
