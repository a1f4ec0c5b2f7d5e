import { type KeyboardEvent, type PointerEvent, useRef } from "react";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { movedBorder } from "#src/features/profiles/editor/zone-edits.ts";

interface Props {
  /** index of the zone below */
  z: number;
  /** pixel row of the border, and of its handle, which makes room for those beside it */
  y: number;
  handleY: number;
  editing: ProfileEditing;
  /** height on the axis at a pixel row of the column */
  heightOf(y: number): number;
}

const UNIT_TEXT = { mm: " mm", layer: "", fraction: " of the height" } as const;

/** A border between two zones: a line at its height, and a handle with the number at the right. */
export function ZoneBorder({ z, y, handleY, editing, heightOf }: Props) {
  const { profile, scale } = editing;
  const drag = useRef<{ gesture: string; offPx: number } | undefined>(undefined);
  const [below, above] = [profile.zones[z], profile.zones[z + 1]];
  const border = below.to ?? 0;
  const rowOf = (event: PointerEvent<HTMLElement>) => {
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
      className="group absolute right-0 flex h-6 w-11 -translate-y-1/2 cursor-row-resize touch-none items-center justify-end"
      style={{ top: handleY }}
      onKeyDown={onKeyDown}
      onBlur={editing.rest}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture?.(event.pointerId);
        // A handle that makes room for another lies off its border: the border must not jump to the hand.
        const offPx = handleY - y;
        drag.current = { gesture: `border ${z} drag`, offPx };
        editing.rest();
      }}
      onPointerMove={(event) => {
        if (drag.current === undefined) return;
        const { gesture, offPx } = drag.current;
        editing.edit(movedBorder(profile, z, scale.borderAt(heightOf(rowOf(event) - offPx)), scale), gesture);
      }}
      onPointerUp={end}
      onPointerCancel={end}
    >
      {/* The line lies across the bands at the true height; its hit area is a little higher than it looks. */}
      <span
        aria-hidden="true"
        className="absolute right-full flex h-2 w-[calc(100cqw-2.75rem)] items-center"
        style={{ top: `calc(50% + ${y - handleY}px - 0.25rem)` }}
      >
        <span className="h-px w-full bg-ink group-hover:h-0.5 group-focus-visible:h-0.5" />
      </span>
      <span aria-hidden="true" className="pr-1 font-mono text-fine">
        {border}
      </span>
    </div>
  );
}
