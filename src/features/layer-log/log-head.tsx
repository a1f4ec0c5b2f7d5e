import { LineSample } from "#src/features/layer-log/line-sample.tsx";
import type { Column, LogLayout } from "#src/features/layer-log/log-layout.ts";
import { MEASURED } from "#src/features/layer-log/reading-tracks.ts";
import type { Track } from "#src/features/layer-log/track.ts";
import { unitAfter } from "#src/features/layer-log/value-text.ts";
import { fixedText } from "#src/lib/number-text.ts";

interface Props {
  layout: LogLayout;
  tracks: readonly Track[];
  /** position of the layer whose values are shown, -1 for none */
  position: number;
  layerText: { number: string; height: string; of: string };
  asideTitle?: string;
}

const across = ({ x, width }: Column) => ({ left: x, width });

/** Titles and units of the tracks, the key to their lines, and the values at the crosshair: the head of a strip log. */
export function LogHead({ layout, tracks, position, layerText, asideTitle }: Props) {
  return (
    <div aria-hidden="true" className="relative h-24 border-b border-rule text-fine" style={{ width: layout.width }}>
      <div className="absolute top-2 bottom-1.5 flex flex-col justify-between" style={across(layout.axis)}>
        <span className="pl-2 font-semibold">Layer</span>
        <span className="flex flex-col pr-2 text-right font-mono">
          <span className="text-soft">{layerText.of}</span>
          {position >= 0 && (
            <>
              <span>{layerText.number}</span>
              <span>
                {layerText.height}
                <span className="pl-1 text-soft">mm</span>
              </span>
            </>
          )}
        </span>
      </div>
      <div className="absolute top-2 bottom-1.5" style={across(layout.silhouette)}>
        <span className="pl-2 font-semibold">Part</span>
      </div>
      {tracks.map((track, i) => (
        <TrackHead key={track.id} track={track} position={position} column={layout.tracks[i]} />
      ))}
      {layout.aside && asideTitle && (
        <div className="absolute top-2 font-semibold" style={across(layout.aside)}>
          {asideTitle}
        </div>
      )}
    </div>
  );
}

const ROOM_FOR_TITLES_PX = 100;

function TrackHead({ track, position, column }: { track: Track; position: number; column: Column }) {
  const { title, shortTitle = title, unit, series, decimals = 1, caution, scale } = track;
  return (
    <div className="absolute top-2 bottom-1.5 flex flex-col justify-between" style={across(column)}>
      <span className="leading-4">
        <span className="font-semibold">{column.width < ROOM_FOR_TITLES_PX ? shortTitle : title}</span>
        {scale === "log" && <span className="text-soft">, log</span>}
        {caution && (
          <span className="block truncate border-b border-dashed border-rule text-[0.6875rem] tracking-tighter text-soft">
            {caution}
          </span>
        )}
      </span>
      <span className="flex flex-col">
        {series.map(({ label, style, values }) => (
          <span key={label} className="flex items-center justify-between gap-1.5 whitespace-nowrap">
            {label === MEASURED ? <span /> : <LineSample style={style} />}
            <span className="font-mono">
              {position >= 0 && fixedText(values[position], decimals)}
              {(position < 0 || unitAfter(unit)) && <span className="text-soft"> {unit}</span>}
            </span>
          </span>
        ))}
      </span>
    </div>
  );
}
