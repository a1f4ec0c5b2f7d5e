import type { CurveOver, Profile, Zone } from "#shared/formats/profile.ts";
import { RuleEditor, type RuleRugs } from "#src/features/profiles/editor/rule-editor.tsx";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { removeZone, splitZone, withBorder, withRule, withZone } from "#src/features/profiles/editor/zone-edits.ts";
import { PatternFields, ZoneTarget } from "#src/features/profiles/editor/zone-target.tsx";
import { Button } from "#src/ui/button.tsx";
import { TextField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

export interface ZoneFormProps {
  editing: ProfileEditing;
  /** index of the zone */
  z: number;
  onSelect(zone: number): void;
  rugs?: RuleRugs;
  /** the pinned layer's values, by quantity */
  at?: Partial<Record<CurveOver, number>>;
}

const UNITS = { mm: "mm", layer: "layer", fraction: "0–1" } as const;

/** One zone: where it lies, what it is for, and the rule of every channel. */
export function ZoneForm({ editing, z, onSelect, rugs = {}, at = {} }: ZoneFormProps) {
  const { profile, problems, channels, scale } = editing;
  const zone = profile.zones[z];
  const path = `zones[${z}]`;
  const change = (changes: Partial<Zone>, field: string) =>
    editing.edit(withZone(profile, z, changes), `${path}.${field}`);
  const last = z === profile.zones.length - 1;
  const upper = zone.to === undefined ? scale.topMm : scale.heightOf(zone.to);
  return (
    <section aria-label={`Zone ${zone.name}`} className="flex flex-col gap-4">
      <div className="grid gap-3 sm:grid-cols-2">
        <TextField
          label="Zone"
          value={zone.name}
          error={problemText("Name", problems.at(`${path}.name`))}
          onChange={({ target }) => change({ name: target.value }, "name")}
          onBlur={editing.rest}
        />
        <ZoneTarget editing={editing} z={z} />
      </div>
      <PatternFields editing={editing} z={z} />
      <div className="grid grid-cols-3 gap-3">
        <NumberField
          label="Above"
          unit={UNITS[zone.unit]}
          value={zone.from}
          step={zone.unit === "fraction" ? 0.01 : zone.unit === "layer" ? 1 : 0.1}
          problem={problems.at(`${path}.from`)}
          onChange={(from) =>
            editing.edit(
              z === 0 ? withZone(profile, 0, { from: from as number }) : withBorder(profile, z - 1, from as number),
              `${path}.from`,
            )
          }
        />
        <NumberField
          label="Up to"
          unit={UNITS[zone.unit]}
          hint={last ? "empty: to the top" : undefined}
          value={zone.to}
          step={zone.unit === "fraction" ? 0.01 : zone.unit === "layer" ? 1 : 0.1}
          problem={problems.at(`${path}.to`)}
          onChange={(to) => editing.edit(withUpper(profile, z, to), `${path}.to`)}
        />
        <NumberField
          label="Ramp"
          unit="mm"
          hint="from the zone below"
          disabled={z === 0}
          value={zone.rampMm}
          step={0.1}
          problem={problems.at(`${path}.rampMm`)}
          onChange={(rampMm) => change({ rampMm: rampMm ?? 0 }, "rampMm")}
        />
      </div>
      {problems.at(path) && (
        <p className="border-l-2 border-ink pl-2 text-small font-semibold">
          {problemText("This zone", problems.at(path))}
        </p>
      )}
      {channels
        .filter(({ driven }) => driven)
        .map((channel) => {
          const { id, side } = channel;
          const i = zone[side].findIndex((rule) => rule.channel === id);
          if (i < 0) {
            return (
              <p key={id} className="border-t border-hair pt-3">
                <Button
                  onClick={() => editing.edit(withRule(profile, z, side, { channel: id, rule: "fixed", duty: 0 }))}
                >
                  {`Add a rule for ${id}`}
                </Button>
              </p>
            );
          }
          return (
            <RuleEditor
              key={`${z} ${id}`}
              rule={zone[side][i]}
              channel={channel}
              zoneName={zone.name}
              path={`${path}.${side}[${i}]`}
              problems={problems}
              heightsMm={[zone.unit === "mm" ? zone.from : scale.heightOf(zone.from), upper]}
              rugs={rugs}
              at={at}
              leastDuty={Math.max(channel.channel?.minDuty ?? 0, profile.limits[id]?.minDuty ?? 0)}
              mostDuty={Math.min(channel.channel?.maxDuty ?? 1, profile.limits[id]?.maxDuty ?? 1)}
              onChange={(rule, gesture) => editing.edit(withRule(profile, z, side, rule), gesture)}
              onRest={editing.rest}
            />
          );
        })}
      <div className="flex flex-wrap gap-3 border-t border-hair pt-3">
        <Button
          onClick={() => {
            const middle = scale.borderAt((scale.heightOf(zone.from) + upper) / 2);
            editing.edit(splitZone(profile, z, middle, scale));
          }}
        >
          Split this zone
        </Button>
        <Button
          disabled={profile.zones.length < 2}
          onClick={() => {
            editing.edit(removeZone(profile, z));
            onSelect(Math.max(z - 1, 0));
          }}
        >
          Remove this zone
        </Button>
      </div>
    </section>
  );
}

function withUpper(profile: Profile, z: number, to: number | undefined): Profile {
  const last = z === profile.zones.length - 1;
  return last ? withZone(profile, z, { to }) : withBorder(profile, z, to as number);
}
