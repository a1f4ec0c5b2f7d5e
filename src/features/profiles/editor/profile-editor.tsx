import { useState } from "react";
import { BandRuler } from "#src/features/profiles/editor/band-ruler.tsx";
import { ProfileForm, type ProfileFormProps } from "#src/features/profiles/editor/profile-form.tsx";
import { type ProfileEditingInput, useProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { ZoneBands } from "#src/features/profiles/editor/zone-bands.tsx";
import { undoKeys } from "#src/lib/undo-keys.ts";

export interface ProfileEditorProps extends ProfileEditingInput, Pick<ProfileFormProps, "polymers" | "rugs" | "at"> {}

const BANDS_PX = 520;

/** A profile by itself: its zones as bands on a height axis, and everything it says beside them. */
export function ProfileEditor({ polymers, rugs, at, ...input }: ProfileEditorProps) {
  const editing = useProfileEditing(input);
  const [selected, setSelected] = useState(0);
  const axis = { fromMm: 0, toMm: editing.scale.topMm, topPx: 8, bottomPx: BANDS_PX - 8 };
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the fields within it have the focus; this only hears undo
    <div
      className="grid gap-x-8 gap-y-6 md:grid-cols-[13rem_minmax(0,1fr)]"
      onKeyDown={(event) => undoKeys(event, editing)}
    >
      <div className="md:sticky md:top-4 md:self-start">
        <p className="pb-1 text-small font-semibold">Zones</p>
        <div className="flex" style={{ height: BANDS_PX }}>
          <BandRuler axis={axis} unit={editing.part ? "mm" : editing.scale.unit} />
          <div className="min-w-0 grow">
            <ZoneBands editing={editing} axis={axis} selected={selected} onSelect={setSelected} />
          </div>
        </div>
      </div>
      <ProfileForm
        editing={editing}
        selected={selected}
        onSelect={setSelected}
        polymers={polymers}
        rugs={rugs}
        at={at}
      />
    </div>
  );
}
