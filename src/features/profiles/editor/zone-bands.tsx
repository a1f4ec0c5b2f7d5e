import { type KeyboardEvent, type PointerEvent, useRef } from "react";
import type { BandAxis } from "#src/features/profiles/editor/band-axis.ts";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { movedBorder, removeZone, splitZone } from "#src/features/profiles/editor/zone-edits.ts";
import { STATE_FILLS, STATE_NAMES } from "#src/lib/state-fill.ts";

export interface ZoneBandsProps {
  editing: ProfileEditing;
  axis: BandAxis;
  /** the zone whose rules the form shows */
  selected: number;
  onSelect(zone: number): void;
}

/** The profile's zones as bands beside the height axis. Borders are dragged, or moved with the arrow keys. */
export function ZoneBands({ editing, axis, selected, onSelect }: ZoneBandsProps) {
  const { profile, scale } = editing;
  const yOf = (mm: number) =>
    axis.bottomPx - ((mm - axis.fromMm) / (axis.toMm - axis.fromMm)) * (axis.bottomPx - axis.topPx);
  const inside = (y: number) => Math.min(Math.max(y, axis.topPx), axis.bottomPx);
  const heightOf = (y: number) =>
    axis.fromMm + ((axis.bottomPx - y) / (axis.bottomPx - axis.topPx)) * (axis.toMm - axis.fromMm);

  return (
    <div className="relative h-full w-full">
      {profile.zones.map((zone, z) => {
        const [top, bottom] = [
          inside(yOf(zone.to === undefined ? scale.topMm : scale.heightOf(zone.to))),
          inside(yOf(scale.heightOf(zone.from))),
        ];
        if (!(bottom > top)) return null;
        const room = bottom - top;
        return (
          <button
            // biome-ignore lint/suspicious/noArrayIndexKey: a zone is its place in the stack
            key={z}
            type="button"
            aria-pressed={z === selected}
            aria-label={`Zone ${zone.name}, ${STATE_NAMES[zone.target].toLowerCase()}`}
            className="absolute inset-x-0 flex overflow-hidden border border-rule bg-sheet text-left hover:bg-well aria-pressed:border-ink aria-pressed:bg-well"
            style={{ top, height: room + 1 }}
            onClick={() => onSelect(z)}
            onDoubleClick={(event) => {
              const y = event.clientY - event.currentTarget.getBoundingClientRect().top + top;
              editing.edit(splitZone(profile, z, scale.borderAt(heightOf(y)), scale));
            }}
            onKeyDown={(event) => {
              if (event.key === "Delete") editing.edit(removeZone(profile, z));
            }}
          >
            <span
              aria-hidden="true"
              className={z === selected ? "w-5 shrink-0 border-r border-ink" : "w-3.5 shrink-0 border-r border-rule"}
              style={STATE_FILLS[zone.target]}
            />
            <span className="min-w-0 self-center px-1.5 text-fine leading-4">
              {room > 14 && (
                <span className={z === selected ? "block truncate font-semibold" : "block truncate"}>{zone.name}</span>
              )}{" "}
              {room > 34 && <span className="block truncate text-soft">{STATE_NAMES[zone.target].toLowerCase()}</span>}
            </span>
          </button>
        );
      })}
      {profile.zones.slice(0, -1).map((zone, z) => {
        const y = yOf(scale.heightOf(zone.to ?? scale.topMm));
        if (!(y >= axis.topPx && y <= axis.bottomPx)) return null;
        // biome-ignore lint/suspicious/noArrayIndexKey: a border is its place in the stack
        return <Border key={z} z={z} y={y} editing={editing} heightOf={heightOf} />;
      })}
    </div>
  );
}

interface BorderProps {
  z: number;
  y: number;
  editing: ProfileEditing;
  /** height on the axis at a pixel row of the column */
  heightOf(y: number): number;
}

const UNIT_TEXT = { mm: " mm", layer: "", fraction: " of the height" } as const;

function Border({ z, y, editing, heightOf }: BorderProps) {
  const { profile, scale } = editing;
  const drag = useRef<string | undefined>(undefined);
  const [below, above] = [profile.zones[z], profile.zones[z + 1]];
  const border = below.to ?? 0;
  const place = (event: PointerEvent<HTMLElement>) => {
    const column = event.currentTarget.parentElement?.getBoundingClientRect();
    return event.clientY - (column?.top ?? 0);
  };
  const end = () => {
    drag.current = undefined;
    editing.rest();
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const steps = { ArrowUp: 1, ArrowRight: 1, ArrowDown: -1, ArrowLeft: -1, PageUp: 10, PageDown: -10 }[event.key];
    if (steps === undefined) return;
    event.preventDefault();
    const wanted = scale.stepped(border, event.shiftKey ? steps * 10 : steps);
    editing.edit(movedBorder(profile, z, wanted, scale), `border ${z} keys`);
  };
  return (
    <div
      role="slider"
      tabIndex={0}
      aria-orientation="vertical"
      aria-label={`Border between ${below.name} and ${above.name}`}
      aria-valuemin={below.from}
      aria-valuemax={above.to ?? scale.borderAt(scale.topMm)}
      aria-valuenow={border}
      aria-valuetext={scale.unit === "layer" ? `layer ${border}` : `${border}${UNIT_TEXT[scale.unit]}`}
      className="group absolute inset-x-0 flex h-6 -translate-y-1/2 cursor-row-resize touch-none items-center"
      style={{ top: y }}
      onKeyDown={onKeyDown}
      onBlur={editing.rest}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture?.(event.pointerId);
        drag.current = `border ${z} drag`;
        editing.rest();
      }}
      onPointerMove={(event) => {
        if (drag.current === undefined) return;
        editing.edit(movedBorder(profile, z, scale.borderAt(heightOf(place(event))), scale), drag.current);
      }}
      onPointerUp={end}
      onPointerCancel={end}
    >
      <span aria-hidden="true" className="h-px w-full bg-ink group-hover:h-0.5 group-focus-visible:h-0.5" />
      <span aria-hidden="true" className="absolute right-0 bg-sheet pl-1 font-mono text-fine">
        {border}
        {scale.unit === "mm" && <span className="pl-1 text-soft">mm</span>}
      </span>
    </div>
  );
}
