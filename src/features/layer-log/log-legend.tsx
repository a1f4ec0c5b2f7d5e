import type { ReactNode } from "react";
import { LineSample } from "#src/features/layer-log/line-sample.tsx";
import type { Track } from "#src/features/layer-log/track.ts";
import type { BandZone } from "#src/features/layer-log/zone-bands.ts";
import { STATE_FILLS, STATE_NAMES } from "#src/lib/state-fill.ts";

interface Props {
  tracks: readonly Track[];
  zones: readonly BandZone[];
  marked: boolean;
}

/** What lines, hatches and colours mean. */
export function LogLegend({ tracks, zones, marked }: Props) {
  const series = tracks.flatMap((track) => track.series);
  const targets = (["semi-crystalline", "amorphous", "none"] as const).filter((target) =>
    zones.some((zone) => zone.target === target),
  );
  const ranged = series.find(({ low }) => low !== undefined);
  const sliced = series.find(({ style }) => style.line === "dashed");
  const planned = series.find(
    ({ style, label }) => style.line === "solid" && style.tone !== "ink" && label === "as planned",
  );
  return (
    <ul aria-label="Legend" className="flex min-w-0 flex-1 flex-wrap items-center gap-x-5 gap-y-1 text-fine text-soft">
      {targets.length > 0 && (
        <Entry sample={null}>
          <em>state, not appearance</em>
        </Entry>
      )}
      {targets.map((target) => (
        <Entry
          key={target}
          sample={<span className="inline-block h-3.5 w-6 border border-rule" style={STATE_FILLS[target]} />}
        >
          {STATE_NAMES[target]}
        </Entry>
      ))}
      {sliced && <Entry sample={<LineSample style={{ tone: "ink", line: "dashed" }} />}>as sliced</Entry>}
      {planned && <Entry sample={<LineSample style={{ tone: "ink", line: "solid" }} />}>as planned</Entry>}
      {ranged && (
        <Entry sample={<span className="inline-block h-3.5 w-6 border border-rule" style={{ background: RANGE }} />}>
          changes within the layer
        </Entry>
      )}
      {marked && <Entry sample={<Wedge />}>finding or advice</Entry>}
    </ul>
  );
}

const RANGE = "repeating-linear-gradient(135deg, transparent 0 4.66px, var(--cool) 4.66px 5.66px)";

function Entry({ sample, children }: { sample: ReactNode; children: ReactNode }) {
  return (
    <li className="flex items-center gap-1.5">
      {sample}
      <span>{children}</span>
    </li>
  );
}

function Wedge() {
  return (
    <svg aria-hidden="true" width="10" height="10">
      <path d="M1 5 L9 1 L9 9 Z" fill="var(--ink)" stroke="var(--ink)" />
    </svg>
  );
}
