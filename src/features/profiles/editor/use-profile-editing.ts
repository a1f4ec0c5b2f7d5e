import { useMemo } from "react";
import { fitProblems } from "#shared/formats/fit.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import { Profile } from "#shared/formats/profile.ts";
import { type BandPart, type BorderScale, borderScale } from "#src/features/profiles/editor/band-axis.ts";
import { type EditedChannel, editedChannels } from "#src/features/profiles/editor/driven.ts";
import { type DocumentProblems, findProblems } from "#src/lib/document-problems.ts";
import { type History, useHistory } from "#src/lib/use-history.ts";

export interface ProfileEditingInput {
  profile: Profile;
  onChange(profile: Profile): void;
  /** the machine it is written for, where one is chosen */
  machine?: Machine;
  polymer?: Polymer;
  /** the part it is tried on, where there is one */
  part?: BandPart;
}

/** A profile on the table: what bands and form need to show and change it. */
export interface ProfileEditing extends History<Profile> {
  profile: Profile;
  problems: DocumentProblems;
  /** the draft once it has no problem, defaults filled in */
  checked: Profile | undefined;
  channels: EditedChannel[];
  machine: Machine | undefined;
  /** the card of what it is written for, where there is one */
  polymer: Polymer | undefined;
  scale: BorderScale;
  part: BandPart | undefined;
}

/** Undo, problems by place, channels and border scale of the profile that is edited; the caller holds the draft. */
export function useProfileEditing({ profile, onChange, machine, polymer, part }: ProfileEditingInput): ProfileEditing {
  const history = useHistory(profile, onChange);
  const found = useMemo(
    () => findProblems(Profile, profile, (checked) => (machine ? fitProblems(machine, checked, polymer) : [])),
    [profile, machine, polymer],
  );
  const channels = useMemo(() => editedChannels(profile, machine), [profile, machine]);
  const unit = profile.zones[0]?.unit ?? "mm";
  const highest = Math.max(0, ...profile.zones.flatMap(({ from, to }) => [from, to ?? 0]).filter(Number.isFinite));
  const scale = useMemo(() => borderScale(unit, part, highest), [unit, part, highest]);
  const { problems, document: checked } = found;
  return { ...history, profile, problems, checked, channels, machine, polymer, scale, part };
}
