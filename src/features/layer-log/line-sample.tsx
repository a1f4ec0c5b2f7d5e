import type { SeriesStyle, Tone } from "#src/features/layer-log/track.ts";

const COLOURS: Record<Tone, string> = {
  ink: "var(--ink)",
  cool: "var(--cool)",
  heat: "var(--heat)",
  amber: "var(--amber-ink)",
  bone: "var(--bone-edge)",
};
const DASHES = { solid: undefined, dashed: "5 3", dotted: "2 2" };

/** A short piece of a series' line, as the track draws it. */
export function LineSample({ style }: { style: SeriesStyle }) {
  return (
    <svg aria-hidden="true" width="16" height="8" className="shrink-0">
      <line
        x1="0"
        y1="4"
        x2="16"
        y2="4"
        stroke={COLOURS[style.tone]}
        strokeWidth="1.5"
        strokeDasharray={DASHES[style.line]}
      />
    </svg>
  );
}
