import type { BandAxis } from "#src/features/profiles/editor/band-axis.ts";
import type { ProfileEditing } from "#src/features/profiles/editor/use-profile-editing.ts";
import { ZoneBorder } from "#src/features/profiles/editor/zone-border.tsx";
import { removeZone, splitZone } from "#src/features/profiles/editor/zone-edits.ts";
import { apart, atLeast } from "#src/lib/spread.ts";
import { STATE_FILLS, STATE_NAMES } from "#src/lib/state-fill.ts";

export interface ZoneBandsProps {
  editing: ProfileEditing;
  axis: BandAxis;
  /** the zone whose rules the form shows */
  selected: number;
  onSelect(zone: number): void;
}

/** What can be hit with a finger, px. */
const HIT_PX = 24;

/**
 * The profile's zones as bands beside the height axis. The strip at the left lies at the true heights; names beside it
 * have room to be read and hit, however thin a zone is. Borders are dragged, or moved with the arrow keys.
 */
export function ZoneBands({ editing, axis, selected, onSelect }: ZoneBandsProps) {
  const { profile, scale } = editing;
  const yOf = (mm: number) =>
    axis.bottomPx - ((mm - axis.fromMm) / (axis.toMm - axis.fromMm)) * (axis.bottomPx - axis.topPx);
  const inside = (y: number) => Math.min(Math.max(y, axis.topPx), axis.bottomPx);
  const heightOf = (y: number) =>
    axis.fromMm + ((axis.bottomPx - y) / (axis.bottomPx - axis.topPx)) * (axis.toMm - axis.fromMm);

  // From the top down, as they lie on the page.
  const bands = profile.zones
    .map((zone, z) => ({
      zone,
      z,
      top: inside(yOf(zone.to === undefined ? scale.topMm : scale.heightOf(zone.to))),
      bottom: inside(yOf(scale.heightOf(zone.from))),
    }))
    .filter(({ top, bottom }) => bottom > top)
    .reverse();
  const heights = atLeast(
    bands.map(({ top, bottom }) => bottom - top),
    HIT_PX,
  );
  const tops = heights.map((_, i) => heights.slice(0, i).reduce((sum, height) => sum + height, bands[0].top));
  const borders = profile.zones
    .slice(0, -1)
    .map((zone, z) => ({ z, y: yOf(scale.heightOf(zone.to ?? scale.topMm)) }))
    .filter(({ y }) => y >= axis.topPx && y <= axis.bottomPx)
    .reverse();
  const handles = apart(
    borders.map(({ y }) => y),
    HIT_PX,
    [axis.topPx, axis.bottomPx],
  );

  return (
    <div className="@container relative h-full w-full">
      {bands.map(({ zone, z, top, bottom }, i) => (
        <div key={z}>
          <span
            aria-hidden="true"
            className={`absolute left-0 border ${z === selected ? "w-5 border-ink" : "w-3.5 border-rule"}`}
            style={{ top, height: bottom - top + 1, ...STATE_FILLS[zone.target] }}
          />
          <button
            type="button"
            aria-pressed={z === selected}
            aria-label={`Zone ${zone.name}, ${STATE_NAMES[zone.target].toLowerCase()}`}
            className="absolute right-11 left-5 flex items-center overflow-hidden border-y border-hair text-left hover:bg-well aria-pressed:bg-well"
            style={{ top: tops[i], height: heights[i] }}
            onClick={() => onSelect(z)}
            onDoubleClick={(event) => {
              const y = event.clientY - event.currentTarget.getBoundingClientRect().top + tops[i];
              editing.edit(splitZone(profile, z, scale.borderAt(heightOf(y)), scale));
            }}
            onKeyDown={(event) => {
              if (event.key === "Delete") editing.edit(removeZone(profile, z));
            }}
          >
            <span className="min-w-0 px-1.5 text-fine leading-4">
              <span className={z === selected ? "block truncate font-semibold" : "block truncate"}>{zone.name}</span>{" "}
              {heights[i] > 34 && <span className="block text-soft">{STATE_NAMES[zone.target].toLowerCase()}</span>}
            </span>
          </button>
        </div>
      ))}
      {borders.map(({ z, y }, i) => (
        <ZoneBorder key={z} z={z} y={y} handleY={handles[i]} editing={editing} heightOf={heightOf} />
      ))}
    </div>
  );
}
