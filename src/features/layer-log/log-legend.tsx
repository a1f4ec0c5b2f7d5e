import type { ReactNode } from "react";
import { LineSample } from "#src/features/layer-log/line-sample.tsx";
import { MEASURED } from "#src/features/layer-log/reading-tracks.ts";
import type { Track } from "#src/features/layer-log/track.ts";
import type { BandZone } from "#src/features/layer-log/zone-bands.ts";
import { PREDICTED_NAMES, type PredictedState, STATE_FILLS, STATE_NAMES } from "#src/lib/state-fill.ts";

interface Props {
  tracks: readonly Track[];
  zones: readonly BandZone[];
  states?: readonly PredictedState[];
  marked: boolean;
}

/** What lines, hatches and colours mean. */
export function LogLegend({ tracks, zones, states, marked }: Props) {
  const series = tracks.flatMap((track) => track.series);
  const targets = (["semi-crystalline", "amorphous", "none"] as const).filter((target) =>
    zones.some((zone) => zone.target === target),
  );
  const ranged = series.find(({ low, uncertain }) => low !== undefined && !uncertain);
  const uncertain = series.find(({ low, uncertain }) => low !== undefined && uncertain);
  const windowed = tracks.some(({ windows = [] }) => windows.length > 0);
  const lines = new Map(
    series.filter(({ label }) => label !== MEASURED).map(({ label, style }) => [label, style.line]),
  );
  return (
    <ul aria-label="Legend" className="flex min-w-0 flex-1 flex-wrap items-center gap-x-5 gap-y-1 text-fine text-soft">
      {(targets.length > 0 || states) && (
        <Entry sample={null}>
          <em>state, not appearance</em>
        </Entry>
      )}
      {targets.map((target) => (
        <Entry key={target} sample={<Fill of={target} />}>
          {STATE_NAMES[target]}
        </Entry>
      ))}
      {states &&
        (["semi-crystalline", "amorphous", "undecided"] as const)
          .filter((state) => states.includes(state) && !targets.some((target) => target === state))
          .map((state) => (
            <Entry key={state} sample={<Fill of={state} />}>
              {PREDICTED_NAMES[state]}
            </Entry>
          ))}
      {states ? (
        <Entry sample={null}>
          part: <em>as predicted</em>, zones: <em>as wanted</em>
        </Entry>
      ) : (
        targets.length > 0 && (
          <Entry sample={null}>
            part and zones: <em>as wanted</em>
            {lines.has("predicted") ? "" : ", nothing is predicted"}
          </Entry>
        )
      )}
      {[...lines].map(([label, line]) => (
        <Entry key={label} sample={<LineSample style={{ tone: "ink", line }} />}>
          {label}
        </Entry>
      ))}
      {ranged && (
        <Entry sample={<span className="inline-block h-3.5 w-6 border border-rule" style={{ background: RANGE }} />}>
          changes within the layer
        </Entry>
      )}
      {uncertain && (
        <Entry
          sample={<span className="inline-block h-3.5 w-6 border border-rule" style={{ background: UNCERTAIN }} />}
        >
          may lie within
        </Entry>
      )}
      {windowed && (
        <Entry
          sample={
            <span
              className="inline-block h-3.5 w-6 border-r-2 border-amber-ink opacity-70"
              style={STATE_FILLS.amorphous}
            />
          }
        >
          where the target wants it
        </Entry>
      )}
      {marked && (
        <>
          <Entry sample={<Wedge fill="var(--ink)" />}>warning</Entry>
          <Entry sample={<Wedge fill="var(--sheet)" />}>advice or note</Entry>
        </>
      )}
    </ul>
  );
}

const UNCERTAIN = "color-mix(in srgb, var(--ink) 16%, transparent)";
const RANGE = "repeating-linear-gradient(135deg, transparent 0 4.66px, var(--cool) 4.66px 5.66px)";

function Fill({ of }: { of: keyof typeof STATE_FILLS }) {
  return <span className="inline-block h-3.5 w-6 border border-rule" style={STATE_FILLS[of]} />;
}

function Entry({ sample, children }: { sample: ReactNode; children: ReactNode }) {
  return (
    <li className="flex items-center gap-1.5">
      {sample}
      <span>{children}</span>
    </li>
  );
}

function Wedge({ fill }: { fill: string }) {
  return (
    <svg aria-hidden="true" width="10" height="10">
      <path d="M1 5 L9 1 L9 9 Z" fill={fill} stroke="var(--ink)" />
    </svg>
  );
}
