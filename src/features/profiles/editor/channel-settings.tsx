import type { ReactNode } from "react";
import type { Limits, Profile } from "#shared/formats/profile.ts";
import { BedDutyCell, LeadCell, LimitCell } from "#src/features/profiles/editor/channel-cells.tsx";
import type { EditedChannel } from "#src/features/profiles/editor/driven.ts";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { drivingChannel } from "#src/features/profiles/editor/zone-edits.ts";
import { CheckField } from "#src/ui/field.tsx";

const kindOf = ({ channel, side }: EditedChannel) => channel?.kind ?? (side === "cooling" ? "fan" : "heater");

/** Which channels are driven, and what holds for each in all zones: bed layers, limits, how far ahead it is commanded. */
export function ChannelSettings({ editing }: { editing: ProfileEditing }) {
  const { profile, channels, problems } = editing;
  const driven = channels.filter((edited) => edited.driven);
  const wrong = problems.all.some(({ path }) => /^(limits|lead|bedLayers)\b/.test(path));
  return (
    <div className="flex flex-col gap-2">
      <h4 className="text-small font-semibold">Channels</h4>
      {channels.map((edited) => (
        <CheckField
          key={edited.id}
          label={
            <>
              <code className="font-mono">{edited.id}</code> <span className="text-soft">{kindOf(edited)}</span>
              {edited.driven ? "" : ", left as the file has it"}
            </>
          }
          aria-label={`Drive ${edited.id}`}
          checked={edited.driven}
          onChange={({ target }) => editing.edit(drivingChannel(profile, edited.side, edited.id, target.checked))}
        />
      ))}
      {driven.length > 0 && (
        <details open={wrong || undefined}>
          <summary className="min-h-6 text-small font-semibold">
            Limits and timing <span className="font-normal text-soft">{summaryOf(profile)}</span>
          </summary>
          <div className="overflow-x-auto pt-2">
            <LimitTable editing={editing} driven={driven} />
          </div>
        </details>
      )}
    </div>
  );
}

function summaryOf({ limits, lead, bedLayers }: Profile): string {
  const count = [...Object.values(limits).map((one) => Object.keys(one).length), Object.keys(lead).length]
    .concat(bedLayers.count > 0 ? Object.keys(bedLayers.duty).length : 0)
    .reduce((sum, each) => sum + each, 0);
  return count === 0 ? "none given" : `${count} given`;
}

const ROWS: { field: keyof Limits; label: string; unit: string }[] = [
  { field: "minDuty", label: "Least duty", unit: "0–1" },
  { field: "maxDuty", label: "Most duty", unit: "0–1" },
  { field: "maxDutyPerLayer", label: "Change", unit: "a layer" },
  { field: "maxDutyPerS", label: "Change", unit: "a second" },
  { field: "endRampMm", label: "Stepped down over the last", unit: "mm" },
];

/** Rows are limits, columns channels. */
function LimitTable({ editing, driven }: { editing: ProfileEditing; driven: readonly EditedChannel[] }) {
  const heater = driven.some((edited) => kindOf(edited) === "heater");
  return (
    <table aria-label="Limits and timing" className="border-collapse text-small">
      <thead>
        <tr className="border-b border-rule text-left">
          <td />
          {driven.map(({ id }) => (
            <th key={id} scope="col" className="px-2 pb-1 font-mono font-normal">
              {id}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {editing.profile.bedLayers.count > 0 && (
          <Row label="Bed layers" unit="0–1" note="empty: as its zone">
            {driven.map(({ id }) => (
              <BedDutyCell key={id} editing={editing} id={id} />
            ))}
          </Row>
        )}
        {ROWS.filter(({ field }) => field !== "endRampMm" || heater).map(({ field, label, unit }) => (
          <Row key={field} label={label} unit={unit} note="empty: no limit">
            {driven.map((edited) =>
              field === "endRampMm" && kindOf(edited) === "fan" ? (
                <td key={edited.id} className="px-2 py-1 text-right text-soft">
                  –
                </td>
              ) : (
                <LimitCell key={edited.id} {...{ editing, edited, field, label: `${label} ${unit}` }} />
              ),
            )}
          </Row>
        ))}
        <Row label="Ahead" unit="s" note="of the layer it is for">
          {driven.map((edited) => (
            <LeadCell key={edited.id} editing={editing} edited={edited} />
          ))}
        </Row>
      </tbody>
    </table>
  );
}

function Row({ label, unit, note, children }: { label: string; unit: string; note: string; children: ReactNode }) {
  return (
    <tr className="border-b border-hair align-top">
      <th scope="row" className="py-2 pr-3 text-left font-semibold">
        {label} <span className="font-mono font-normal text-soft">{unit}</span>
        <span className="block font-normal text-soft">{note}</span>
      </th>
      {children}
    </tr>
  );
}
