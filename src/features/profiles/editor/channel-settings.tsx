import type { Lead, Limits, Profile } from "#shared/formats/profile.ts";
import type { EditedChannel } from "#src/features/profiles/editor/driven.ts";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { drivingChannel } from "#src/features/profiles/editor/zone-edits.ts";
import { choiceText } from "#src/lib/document-words.ts";
import { CheckField, SelectField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

/** What holds for a channel in all zones: bed layers, limits, and how far ahead it is commanded. */
export function ChannelSettings({ editing, edited }: { editing: ProfileEditing; edited: EditedChannel }) {
  const { profile } = editing;
  const { id, side, driven, channel } = edited;
  const kind = channel?.kind ?? (side === "cooling" ? "fan" : "heater");
  return (
    <fieldset className="flex flex-col gap-3 border-t border-hair pt-2 first:border-t-0 first:pt-0">
      <legend className="sr-only">{`Channel ${id}`}</legend>
      <CheckField
        label={
          <>
            <code className="font-mono">{id}</code> <span className="text-soft">{kind}</span>
            {driven ? "" : ", left as the file has it"}
          </>
        }
        aria-label={`Drive ${id}`}
        checked={driven}
        onChange={({ target }) => editing.edit(drivingChannel(profile, side, id, target.checked))}
      />
      {driven && (
        <div className="grid grid-cols-2 gap-3 pl-8 sm:grid-cols-3 @3xl:grid-cols-4">
          {profile.bedLayers.count > 0 && <BedDuty editing={editing} id={id} />}
          <LimitField
            editing={editing}
            id={id}
            field="minDuty"
            label="Least duty"
            unit="0–1"
            machine={channel?.minDuty}
          />
          <LimitField
            editing={editing}
            id={id}
            field="maxDuty"
            label="Most duty"
            unit="0–1"
            machine={channel?.maxDuty}
          />
          <LimitField editing={editing} id={id} field="maxDutyPerLayer" label="Change" unit="a layer" />
          <LimitField
            editing={editing}
            id={id}
            field="maxDutyPerS"
            label="Change"
            unit="a second"
            machine={channel?.maxDutyPerS}
          />
          {kind === "heater" && (
            <LimitField editing={editing} id={id} field="endRampMm" label="Step-down" unit="last mm" />
          )}
          <LeadFields editing={editing} id={id} settleS={channel?.settleS} />
        </div>
      )}
    </fieldset>
  );
}

function BedDuty({ editing, id }: { editing: ProfileEditing; id: string }) {
  const { profile, problems } = editing;
  return (
    <NumberField
      label="Bed layers"
      unit="0–1"
      hint="empty: as its zone"
      step={0.01}
      value={profile.bedLayers.duty[id]}
      problem={problems.at(`bedLayers.duty.${id}`)}
      onChange={(duty) =>
        editing.edit(
          { ...profile, bedLayers: { ...profile.bedLayers, duty: withEntry(profile.bedLayers.duty, id, duty) } },
          `bedLayers.duty.${id}`,
        )
      }
    />
  );
}

interface LimitProps {
  editing: ProfileEditing;
  id: string;
  field: keyof Limits;
  label: string;
  unit: string;
  /** the machine's own limit, which the profile may only narrow */
  machine?: number;
}

function LimitField({ editing, id, field, label, unit, machine }: LimitProps) {
  const { profile, problems } = editing;
  const path = `limits.${id}.${field}`;
  return (
    <NumberField
      label={label}
      unit={unit}
      hint={machine === undefined ? (field === "endRampMm" ? "empty: none" : "empty: no limit") : `machine: ${machine}`}
      step={field === "endRampMm" ? 0.5 : 0.01}
      value={profile.limits[id]?.[field]}
      problem={problems.at(path)}
      onChange={(value) => editing.edit(withLimit(profile, id, field, value), path)}
    />
  );
}

/** An entry without any limit is left out of the document. */
export function withLimit(profile: Profile, id: string, field: keyof Limits, value: number | undefined): Profile {
  const limits = withEntry<number>({ ...profile.limits[id] }, field, value);
  const empty = Object.keys(limits).length === 0;
  return { ...profile, limits: withEntry<Limits>(profile.limits, id, empty ? undefined : limits) };
}

function withEntry<Value>(
  entries: Record<string, Value>,
  key: string,
  value: Value | undefined,
): Record<string, Value> {
  const { [key]: _, ...rest } = entries;
  return value === undefined ? rest : { ...rest, [key]: value };
}

function LeadFields({ editing, id, settleS }: { editing: ProfileEditing; id: string; settleS: number | undefined }) {
  const { profile, problems } = editing;
  const lead: Lead = profile.lead[id] ?? 0;
  const settle = lead === "settle";
  const set = (value: Lead | undefined, gesture?: string) =>
    editing.edit({ ...profile, lead: withEntry(profile.lead, id, value) }, gesture);
  return (
    <>
      <SelectField
        label="Ahead"
        hint={settle && settleS !== undefined ? `${settleS / 2} s ahead` : undefined}
        error={settle ? problemText("Ahead", problems.at(`lead.${id}`)) : undefined}
        value={settle ? "settle" : "seconds"}
        onChange={({ target }) => set(target.value === "settle" ? "settle" : 0)}
      >
        <option value="seconds">in seconds</option>
        <option value="settle">{choiceText("settle")}</option>
      </SelectField>
      {!settle && (
        <NumberField
          label="Ahead by"
          unit="s"
          step={0.1}
          value={lead}
          problem={problems.at(`lead.${id}`)}
          onChange={(value) => set(value, `lead.${id}`)}
        />
      )}
    </>
  );
}
