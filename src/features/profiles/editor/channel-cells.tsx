import type { ReactNode } from "react";
import type { Lead, Limits, Profile } from "#shared/formats/profile.ts";
import type { EditedChannel } from "#src/features/profiles/editor/driven.ts";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { choiceText } from "#src/lib/document-words.ts";
import { NumberCell, problemText } from "#src/ui/number-field.tsx";

function Cell({ note, error, children }: { note?: string; error?: string; children: ReactNode }) {
  return (
    <td className="px-2 py-1.5">
      {children}
      {note && <span className="block text-soft">{note}</span>}
      {error && <p className="max-w-56 border-l-2 border-ink pl-2 font-semibold">{error}</p>}
    </td>
  );
}

/** A channel's duty in the bed layers. */
export function BedDutyCell({ editing, id }: { editing: ProfileEditing; id: string }) {
  const { profile, problems } = editing;
  const path = `bedLayers.duty.${id}`;
  return (
    <Cell error={problemText("Bed layers", problems.at(path))}>
      <NumberCell
        label={`Bed layers 0–1, ${id}`}
        step={0.01}
        share
        value={profile.bedLayers.duty[id]}
        problem={problems.at(path)}
        onChange={(duty) =>
          editing.edit(
            { ...profile, bedLayers: { ...profile.bedLayers, duty: withEntry(profile.bedLayers.duty, id, duty) } },
            path,
          )
        }
      />
    </Cell>
  );
}

interface LimitProps {
  editing: ProfileEditing;
  edited: EditedChannel;
  field: keyof Limits;
  label: string;
}

/** One limit of a channel; beside it the machine's own, which the profile may only narrow. */
export function LimitCell({ editing, edited: { id, channel }, field, label }: LimitProps) {
  const { profile, problems } = editing;
  const path = `limits.${id}.${field}`;
  const machine = field === "endRampMm" || field === "maxDutyPerLayer" ? undefined : channel?.[field];
  return (
    <Cell
      note={machine === undefined ? undefined : `machine: ${machine}`}
      error={problemText(label, problems.at(path))}
    >
      <NumberCell
        label={`${label}, ${id}`}
        step={field === "endRampMm" ? 0.5 : 0.01}
        share={field === "minDuty" || field === "maxDuty"}
        value={profile.limits[id]?.[field]}
        problem={problems.at(path)}
        onChange={(value) => editing.edit(withLimit(profile, id, field, value), path)}
      />
    </Cell>
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

/** How far ahead a channel is commanded: so many seconds, or half of what it takes to settle. */
export function LeadCell({ editing, edited: { id, channel } }: { editing: ProfileEditing; edited: EditedChannel }) {
  const { profile, problems } = editing;
  const lead: Lead = profile.lead[id] ?? 0;
  const settle = lead === "settle";
  const problem = problems.at(`lead.${id}`);
  const set = (value: Lead | undefined, gesture?: string) =>
    editing.edit({ ...profile, lead: withEntry(profile.lead, id, value) }, gesture);
  return (
    <Cell
      note={settle && channel?.settleS !== undefined ? `${channel.settleS / 2} s` : undefined}
      error={problemText("Ahead", problem)}
    >
      <select
        aria-label={`Ahead, ${id}`}
        className="mb-1 block min-h-8 rounded border border-rule bg-sheet px-1.5 hover:border-ink"
        value={settle ? "settle" : "seconds"}
        onChange={({ target }) => set(target.value === "settle" ? "settle" : 0)}
      >
        <option value="seconds">in seconds</option>
        <option value="settle">{choiceText("settle")}</option>
      </select>
      {!settle && (
        <NumberCell
          label={`Ahead by s, ${id}`}
          step={0.1}
          value={lead}
          problem={problem}
          onChange={(value) => set(value, `lead.${id}`)}
        />
      )}
    </Cell>
  );
}
