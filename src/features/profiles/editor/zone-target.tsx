import type { Pattern, Zone } from "#shared/formats/profile.ts";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { withZone } from "#src/features/profiles/editor/zone-edits.ts";
import { STATE_NAMES, type TargetState } from "#src/lib/state-fill.ts";
import { SelectField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

type Wanted = TargetState | Pattern["kind"];

const PATTERN_NAMES: Record<Pattern["kind"], string> = {
  alternating: "Both, by turns",
  graded: "From one to the other",
};

const STARTS: Record<Pattern["kind"], Pattern> = {
  alternating: { kind: "alternating", amorphousLayers: 5, semiCrystallineLayers: 5, first: "amorphous" },
  graded: { kind: "graded", from: "semi-crystalline", to: "amorphous" },
};

/** The zone under another target: a pattern says the states itself, and the target is then none. */
export function withWanted({ pattern: _, ...zone }: Zone, wanted: Wanted): Zone {
  if (wanted === "alternating" || wanted === "graded") return { ...zone, target: "none", pattern: STARTS[wanted] };
  return { ...zone, target: wanted };
}

/** The state that a zone is for, or the pattern of states within it. */
export function ZoneTarget({ editing, z }: { editing: ProfileEditing; z: number }) {
  const { profile, problems } = editing;
  const zone = profile.zones[z];
  const path = `zones[${z}]`;
  const replace = (next: Zone) =>
    editing.edit({ ...profile, zones: profile.zones.map((each, i) => (i === z ? next : each)) }, `${path}.target`);
  return (
    <SelectField
      label="Target"
      value={zone.pattern?.kind ?? zone.target}
      error={
        problemText("Target", problems.at(`${path}.target`)) ?? problemText("Pattern", problems.at(`${path}.pattern`))
      }
      onChange={({ target }) => replace(withWanted(zone, target.value as Wanted))}
    >
      {[...Object.entries(STATE_NAMES), ...Object.entries(PATTERN_NAMES)].map(([wanted, name]) => (
        <option key={wanted} value={wanted}>
          {name}
        </option>
      ))}
    </SelectField>
  );
}

/** The numbers of a zone's pattern, where it has one. */
export function PatternFields({ editing, z }: { editing: ProfileEditing; z: number }) {
  const { profile, problems } = editing;
  const { pattern } = profile.zones[z];
  if (!pattern) return null;
  const path = `zones[${z}].pattern`;
  const set = (next: Pattern, field: string) =>
    editing.edit(withZone(profile, z, { pattern: next }), `${path}.${field}`);
  const state = (
    label: string,
    field: string,
    value: string,
    change: (state: "amorphous" | "semi-crystalline") => Pattern,
  ) => (
    <SelectField
      label={label}
      value={value}
      error={problemText(label, problems.at(`${path}.${field}`))}
      onChange={({ target }) => set(change(target.value as "amorphous" | "semi-crystalline"), field)}
    >
      <option value="amorphous">{STATE_NAMES.amorphous}</option>
      <option value="semi-crystalline">{STATE_NAMES["semi-crystalline"]}</option>
    </SelectField>
  );
  if (pattern.kind === "graded") {
    return (
      <div className="grid gap-3 sm:grid-cols-2">
        {state("At the zone's foot", "from", pattern.from, (from) => ({ ...pattern, from }))}
        {state("At its top", "to", pattern.to, (to) => ({ ...pattern, to }))}
      </div>
    );
  }
  return (
    <div className="grid grid-cols-3 gap-3">
      {(["amorphousLayers", "semiCrystallineLayers"] as const).map((field) => (
        <NumberField
          key={field}
          label={field === "amorphousLayers" ? "Amorphous" : "Semi-crystalline"}
          unit="layers"
          step={1}
          value={pattern[field]}
          problem={problems.at(`${path}.${field}`)}
          onChange={(layers) => set({ ...pattern, [field]: layers as number }, field)}
        />
      ))}
      {state("Begins with", "first", pattern.first, (first) => ({ ...pattern, first }))}
    </div>
  );
}
