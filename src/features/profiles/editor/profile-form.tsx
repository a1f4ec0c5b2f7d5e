import { useState } from "react";
import type { Margins, Profile } from "#shared/formats/profile.ts";
import { type BorderUnit, borderScale } from "#src/features/profiles/editor/band-axis.ts";
import { ChannelSettings } from "#src/features/profiles/editor/channel-settings.tsx";
import { ProblemList } from "#src/features/profiles/editor/problem-list.tsx";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { addZone, inUnit } from "#src/features/profiles/editor/zone-edits.ts";
import { ZoneForm, type ZoneFormProps } from "#src/features/profiles/editor/zone-form.tsx";
import { named, wordsOf } from "#src/lib/document-words.ts";
import { Button } from "#src/ui/button.tsx";
import { SelectField, TextField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

export interface ProfileFormProps extends Pick<ZoneFormProps, "rugs" | "at"> {
  editing: ProfileEditing;
  selected: number;
  onSelect(zone: number): void;
  /** names of polymer cards to choose from; left out: the name is typed */
  polymers?: readonly string[];
}

/** Everything a profile says, the selected zone first. */
export function ProfileForm({ editing, selected, onSelect, polymers, rugs, at }: ProfileFormProps) {
  const { profile } = editing;
  const z = Math.min(selected, profile.zones.length - 1);
  return (
    // Beside the layer log it is narrow, on a page of its own wide: its columns go by its own width.
    <div className="@container flex flex-col gap-6">
      <div className="flex flex-wrap items-center gap-3">
        <Button disabled={!editing.canUndo} onClick={editing.undo} aria-keyshortcuts="Control+Z">
          Undo
        </Button>
        <Button disabled={!editing.canRedo} onClick={editing.redo} aria-keyshortcuts="Control+Shift+Z">
          Redo
        </Button>
        <Button
          onClick={() => {
            editing.edit(addZone(profile, editing.scale));
            onSelect(profile.zones.length);
          }}
        >
          Add a zone on top
        </Button>
        <ProblemList profile={profile} problems={editing.problems.all} onSelect={onSelect} />
      </div>
      <HigherZones editing={editing} selected={z} onSelect={onSelect} />
      {z >= 0 && <ZoneForm editing={editing} z={z} onSelect={onSelect} rugs={rugs} at={at} />}
      <WholeProfile editing={editing} polymers={polymers} />
    </div>
  );
}

/** Zones that begin above the part at hand have no band beside it. */
function HigherZones({ editing, selected, onSelect }: Pick<ProfileFormProps, "editing" | "selected" | "onSelect">) {
  const { profile, scale, part } = editing;
  if (!part) return null;
  const higher = profile.zones.flatMap(({ name, from }, z) =>
    scale.heightOf(from) >= scale.topMm ? [{ name, from, z }] : [],
  );
  if (higher.length === 0) return null;
  return (
    <p className="flex flex-wrap items-center gap-x-3 gap-y-1 text-small">
      <span className="text-soft">Above this part:</span>
      {higher.map(({ name, from, z }) => (
        <Button key={z} weight="quiet" className="text-small" aria-pressed={z === selected} onClick={() => onSelect(z)}>
          {name}, from {from}
          {scale.unit === "mm" ? " mm" : ""}
        </Button>
      ))}
    </p>
  );
}

/** What holds for the profile as a whole. */
export function WholeProfile({ editing, polymers }: Pick<ProfileFormProps, "editing" | "polymers">) {
  const { profile, problems } = editing;
  const change = (changes: Partial<Profile>, field: string) => editing.edit({ ...profile, ...changes }, field);
  return (
    <section aria-label="The whole profile" className="flex flex-col gap-4 border-t border-ink pt-4">
      <h3 className="font-semibold">The whole profile</h3>
      <div className="grid gap-3 sm:grid-cols-2">
        <TextField
          label="Name"
          className="sm:col-span-2"
          value={profile.name}
          error={problemText("Name", problems.at("name"))}
          onChange={({ target }) => change({ name: target.value }, "name")}
          onBlur={editing.rest}
        />
        <PolymerField editing={editing} polymers={polymers} />
        <UnitField editing={editing} />
        <SelectField
          label={wordsOf("withinLayer")}
          hint="those of the file, on bridges and overhangs"
          value={profile.withinLayer}
          onChange={({ target }) => change({ withinLayer: target.value as Profile["withinLayer"] }, "withinLayer")}
        >
          <option value="replace">replace them</option>
          <option value="keep-raises">keep raises above the plan</option>
        </SelectField>
        <NumberField
          label="Bed layers"
          hint="layers of each object with duties of their own"
          step={1}
          value={profile.bedLayers.count}
          problem={problems.at("bedLayers.count")}
          onChange={(count) => change({ bedLayers: { ...profile.bedLayers, count: count ?? 0 } }, "bedLayers.count")}
        />
      </div>
      <ChannelSettings editing={editing} />
      <MarginFields editing={editing} />
    </section>
  );
}

function PolymerField({ editing, polymers }: Pick<ProfileFormProps, "editing" | "polymers">) {
  const { profile, problems } = editing;
  const set = (polymer: string) => editing.edit({ ...profile, polymer }, "polymer");
  const error = problemText("Polymer", problems.at("polymer"));
  if (!polymers || polymers.length === 0) {
    return (
      <TextField
        label="Polymer"
        value={profile.polymer}
        error={error}
        onChange={({ target }) => set(target.value)}
        onBlur={editing.rest}
      />
    );
  }
  const known = polymers.includes(profile.polymer);
  return (
    <SelectField label="Polymer" value={profile.polymer} error={error} onChange={({ target }) => set(target.value)}>
      {!known && (
        <option value={profile.polymer}>
          {profile.polymer === "" ? "choose one" : `${profile.polymer} (no card)`}
        </option>
      )}
      {polymers.map((name) => (
        <option key={name}>{name}</option>
      ))}
    </SelectField>
  );
}

function UnitField({ editing }: { editing: ProfileEditing }) {
  const { profile, scale, part, problems } = editing;
  const misplaced = profile.zones
    .map((_, z) => problems.at(`zones[${z}].unit`))
    .find((message) => message !== undefined);
  return (
    <SelectField
      label="Borders of zones in"
      hint={part ? "converted at the heights of this part" : "numbers stay as they are: no part is open"}
      error={problemText("Unit", misplaced)}
      value={scale.unit}
      onChange={({ target }) => {
        const unit = target.value as BorderUnit;
        const next = part
          ? inUnit(profile, unit, scale, borderScale(unit, part, 0))
          : { ...profile, zones: profile.zones.map((zone) => ({ ...zone, unit })) };
        editing.edit(next);
      }}
    >
      <option value="mm">mm above the bed</option>
      <option value="layer">layer numbers</option>
      <option value="fraction">fractions of the height</option>
    </SelectField>
  );
}

const MARGINS: { field: keyof Margins; step: number }[] = [
  { field: "belowTgC", step: 1 },
  { field: "aboveTgC", step: 1 },
  { field: "maxCrystallinity", step: 0.01 },
  { field: "minCrystallinity", step: 0.01 },
];

/** The polymer card's margins hold unless the profile gives its own. */
function MarginFields({ editing }: { editing: ProfileEditing }) {
  const { profile, problems, polymer } = editing;
  const [open, setOpen] = useState(profile.margins !== undefined);
  const set = (field: keyof Margins, value: number | undefined) => {
    const { [field]: _, ...rest } = profile.margins ?? {};
    const margins = value === undefined ? rest : { ...rest, [field]: value };
    const { margins: __, ...without } = profile;
    editing.edit(Object.keys(margins).length === 0 ? without : { ...without, margins }, `margins.${field}`);
  };
  return (
    <details open={open} onToggle={({ currentTarget }) => setOpen(currentTarget.open)}>
      <summary className="text-small font-semibold">Margins of its own</summary>
      <p className="py-1 text-small text-soft">Empty: as the polymer card says.</p>
      <div className="grid gap-3 sm:grid-cols-2 @3xl:grid-cols-4">
        {MARGINS.map(({ field, step }) => (
          <NumberField
            key={field}
            {...named(`margins.${field}`)}
            step={step}
            hint={polymer && `card: ${polymer.margins[field].value}`}
            value={profile.margins?.[field]}
            problem={problems.at(`margins.${field}`)}
            onChange={(value) => set(field, value)}
          />
        ))}
      </div>
    </details>
  );
}
