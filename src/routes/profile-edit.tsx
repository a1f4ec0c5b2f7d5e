import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { Profile } from "#shared/formats/profile.ts";
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
  const machines = useQuery(documentsQuery(MACHINES));
  const [machineId, setMachineId] = useState<string>();
  const chosen = machines.data?.find(({ id }) => id === machineId) ?? machines.data?.[0];
  const machine = useQuery({
    ...versionQuery(MACHINES, chosen?.id ?? "", chosen?.latest.number ?? 1),
    enabled: chosen !== undefined && machineId !== "",
  });
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
        {machines.data?.map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
        <option value="">no machine</option>
      </SelectField>
      <ProfileEditor
        profile={profile}
        onChange={onChange}
        machine={machineId === "" ? undefined : machine.data?.document}
        polymer={polymer}
        polymers={names}
      />
    </>
  );
}

const editor = (profile: Profile, onChange: (profile: Profile) => void) => <Editor profile={profile} onChange={onChange} />;

export const EditProfile = () => <EditPage kind={PROFILES} editor={editor} />;
export const NewProfile = () => <NewPage kind={PROFILES} start={() => newProfile("PEEK")} editor={editor} />;
