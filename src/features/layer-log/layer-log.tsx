import { type KeyboardEvent, type ReactNode, useMemo, useRef, useState } from "react";
import {
  fitRange,
  type HeightRange,
  type HeightView,
  isWhole,
  rangeShowing,
  wholeRange,
  zoomedAbout,
} from "#src/features/layer-log/height-view.ts";
import { LayerAnnouncer } from "#src/features/layer-log/layer-announcer.tsx";
import { type LayerStack, positionOfIndex } from "#src/features/layer-log/layer-stack.ts";
import { LayerTable } from "#src/features/layer-log/layer-table.tsx";
import { layerText, spokenLayer } from "#src/features/layer-log/layer-text.ts";
import { LogHead } from "#src/features/layer-log/log-head.tsx";
import { logStep } from "#src/features/layer-log/log-keys.ts";
import { logLayout } from "#src/features/layer-log/log-layout.ts";
import { LogLegend } from "#src/features/layer-log/log-legend.tsx";
import { viewOf } from "#src/features/layer-log/log-picture.ts";
import { MarkNotes } from "#src/features/layer-log/mark-notes.tsx";
import type { LogLayer } from "#src/features/layer-log/reading-tracks.ts";
import { shownPositions } from "#src/features/layer-log/trace.ts";
import type { LogMark, Track } from "#src/features/layer-log/track.ts";
import { useBoxSize } from "#src/features/layer-log/use-box-size.ts";
import { useLogCanvas } from "#src/features/layer-log/use-log-canvas.ts";
import { useLogContent } from "#src/features/layer-log/use-log-content.ts";
import { useLogPointer } from "#src/features/layer-log/use-log-pointer.ts";
import { trackText } from "#src/features/layer-log/value-text.ts";
import type { BandZone } from "#src/features/layer-log/zone-bands.ts";
import type { PredictedState } from "#src/lib/state-fill.ts";
import { Button } from "#src/ui/button.tsx";

/** What stands in the column at the right is told which heights are shown where. */
export interface LogAsideView extends HeightView {
  heightPx: number;
  stack: LayerStack;
}

export interface LayerLogProps {
  /** in print order */
  layers: readonly LogLayer[];
  /** from left to right; see readingTracks */
  tracks: readonly Track[];
  /** index of the pinned layer */
  pinnedLayer: number | null;
  onPin(layer: number): void;
  /** Escape, with nothing else to step back from; left out: a pinned layer stays pinned */
  onUnpin?(): void;
  /** index of the layer under the crosshair, null when it leaves */
  onHover?(layer: number | null): void;
  /** findings of the reading, advice of the plan */
  marks?: readonly LogMark[];
  /** the profile's zones: they fill the silhouette and stand as bands at the right */
  zones?: readonly BandZone[];
  /** the predicted state of every layer: they fill the silhouette in place of the zones' targets */
  states?: readonly PredictedState[];
  /** draws the column at the right in place of the bands, for instance to edit them */
  aside?: { title: string; widthPx: number; render(view: LogAsideView): ReactNode };
  label?: string;
  /** read out behind the pinned layer's values, such as the reasons for its duties */
  spoken?: string;
  /** height of the plot; the log is as wide as its box */
  heightPx?: number;
}

/** A band that is marked with the keys: positions of the layers it begins and ends with, in any order. */
interface MarkedBand {
  from: number;
  to: number;
}

function bandOf({ bottomMm, topMm }: LayerStack, { from, to }: MarkedBand): HeightRange {
  return { fromMm: Math.min(bottomMm[from], bottomMm[to]), toMm: Math.max(topMm[from], topMm[to]) };
}

const spokenBand = ({ index }: LayerStack, { from, to }: MarkedBand): string =>
  `Layers ${index[Math.min(from, to)]} to ${index[Math.max(from, to)]}`;

const NO_MARKS: readonly LogMark[] = [];
const NO_ZONES: readonly BandZone[] = [];
const BANDS_PX = 146;

/**
 * The layer log: narrow tracks over one height axis, as a borehole log is drawn, with one crosshair through all of them.
 * Dragging over the silhouette zooms; a click or the arrow keys pin a layer. With Shift the arrow keys mark a band, which
 * Enter zooms to.
 */
export function LayerLog(props: LayerLogProps) {
  const { layers, tracks, pinnedLayer, onPin, onUnpin, onHover, aside, label = "Layer log", heightPx = 560 } = props;
  const { marks = NO_MARKS, zones = NO_ZONES, states, spoken } = props;
  const box = useRef<HTMLDivElement>(null);
  const [base, over] = [useRef<HTMLCanvasElement>(null), useRef<HTMLCanvasElement>(null)];
  const { width } = useBoxSize(box, { width: 960, height: heightPx });
  const content = useLogContent(layers, tracks, zones, marks, states);
  const { stack } = content;
  const [wanted, setWanted] = useState<HeightRange>();
  const [hovered, setHovered] = useState(-1);
  const [asTable, setAsTable] = useState(false);
  const [marked, setMarked] = useState<MarkedBand>();

  const range = useMemo(() => (wanted ? fitRange(stack, wanted) : wholeRange(stack)), [stack, wanted]);
  const view = useMemo(() => viewOf(range, heightPx), [range, heightPx]);
  const asidePx = aside?.widthPx ?? (zones.length > 0 ? BANDS_PX : 0);
  const layout = useMemo(() => logLayout(width, tracks.length, asidePx), [width, tracks.length, asidePx]);
  const pinned = pinnedLayer === null ? -1 : positionOfIndex(stack, pinnedLayer);
  const zoomed = !isWhole(stack, range);

  const pin = (position: number) => {
    if (position < 0) return;
    setMarked(undefined);
    if (wanted) setWanted(rangeShowing(stack, range, stack.bottomMm[position], stack.topMm[position]));
    onPin(stack.index[position]);
  };
  const hover = (position: number) => {
    if (position === hovered) return;
    setHovered(position);
    onHover?.(position < 0 ? null : stack.index[position]);
  };
  const zoomOut = () => setWanted(undefined);
  const pointer = useLogPointer({
    stack,
    view,
    silhouette: layout.silhouette,
    onPin: pin,
    onZoom: (zoom) => setWanted(fitRange(stack, zoom)),
    onHover: hover,
  });
  const keyBand = useMemo(() => marked && bandOf(stack, marked), [stack, marked]);
  const band = pointer.band ?? keyBand;
  const marker = useMemo(() => ({ pinned, hovered, band }), [pinned, hovered, band]);
  useLogCanvas(base, over, { content, layout, view, heightPx, bandColumn: aside === undefined, pointer: marker });

  const onKeyDown = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const [first, last] = shownPositions(stack, view);
    const page = Math.max(1, Math.round((last - first + 1) / 10));
    const step = logStep(event, { pinned, marked: marked?.to ?? -1, count: stack.count, page });
    if (!step) return;
    event.preventDefault();
    if ("pin" in step) return pin(step.pin);
    if ("mark" in step) {
      const [bottomMm, topMm] = [stack.bottomMm[step.mark], stack.topMm[step.mark]];
      if (wanted) setWanted(rangeShowing(stack, range, bottomMm, topMm));
      return setMarked({ from: marked?.from ?? (pinned < 0 ? step.mark : pinned), to: step.mark });
    }
    pointer.drop();
    if ("back" in step) return marked ? setMarked(undefined) : zoomed ? zoomOut() : onUnpin?.();
    if (step.zoom === "band") {
      if (keyBand) setWanted(fitRange(stack, keyBand));
      return setMarked(undefined);
    }
    const about = pinned < 0 ? (range.fromMm + range.toMm) / 2 : stack.topMm[pinned];
    setWanted(zoomedAbout(stack, range, about, step.zoom === "in" ? 0.5 : 2));
  };

  const shown = hovered >= 0 ? hovered : pinned;
  return (
    <section aria-label={label} className="bg-sheet">
      <div ref={box} className="overflow-x-auto">
        {asTable ? (
          <LayerTable stack={stack} tracks={tracks} pinned={pinned} onPin={pin} heightPx={heightPx + 96} />
        ) : (
          <>
            <div className="relative">
              <LogHead
                layout={layout}
                tracks={tracks}
                position={shown}
                layerText={layerText(stack, shown)}
                asideTitle={aside?.title ?? (zones.length > 0 ? "Zones" : undefined)}
              />
              {zoomed && (
                <Button
                  weight="quiet"
                  className="absolute bottom-1 text-small"
                  style={{ left: layout.silhouette.x + 8 }}
                  onClick={zoomOut}
                >
                  Whole part
                </Button>
              )}
            </div>
            <div className="relative" style={{ width: layout.width, height: heightPx }}>
              <div
                role="slider"
                tabIndex={0}
                aria-label={`${label}, pinned layer`}
                aria-orientation="vertical"
                aria-valuemin={1}
                aria-valuemax={Math.max(stack.count, 1)}
                aria-valuenow={pinned < 0 ? 1 : pinned + 1}
                aria-valuetext={pinned < 0 ? "No layer pinned" : spokenLayer(stack, pinned)}
                className="absolute inset-y-0 left-0 cursor-crosshair outline-offset-[-2px] select-none"
                style={{ width: layout.aside?.x ?? layout.width }}
                onKeyDown={onKeyDown}
                onDoubleClick={zoomOut}
                {...pointer.handlers}
              >
                <canvas
                  ref={base}
                  className="pointer-events-none absolute inset-0"
                  style={{ width: layout.width, height: heightPx }}
                />
                <canvas
                  ref={over}
                  className="pointer-events-none absolute inset-0"
                  style={{ width: layout.width, height: heightPx }}
                />
                {/* A finger on the silhouette draws a band; elsewhere it scrolls the page. */}
                <span
                  aria-hidden="true"
                  className="absolute inset-y-0 cursor-row-resize touch-none"
                  style={{ left: layout.silhouette.x, width: layout.silhouette.width }}
                />
              </div>
              {aside && layout.aside && (
                <div className="absolute inset-y-0" style={{ left: layout.aside.x, width: layout.aside.width }}>
                  {aside.render({ ...view, heightPx, stack })}
                </div>
              )}
            </div>
          </>
        )}
      </div>
      <footer className="flex flex-wrap items-start justify-between gap-x-6 gap-y-1 border-t border-hair px-2 py-1.5">
        <LogLegend tracks={tracks} zones={zones} states={states} marked={marks.length > 0} />
        {/* biome-ignore lint/a11y/useSemanticElements: two buttons are no set of form fields */}
        <span role="group" aria-label="Layers as" className="ml-auto flex gap-3 text-small">
          {[
            { name: "Log", table: false },
            { name: "Table", table: true },
          ].map(({ name, table }) => (
            <button
              key={name}
              type="button"
              aria-pressed={asTable === table}
              onClick={() => setAsTable(table)}
              className="min-h-6 border-b-2 border-transparent px-1 text-soft hover:text-ink aria-pressed:border-ink aria-pressed:font-semibold aria-pressed:text-ink"
            >
              {name}
            </button>
          ))}
        </span>
      </footer>
      <MarkNotes marks={marks} layer={shown < 0 ? undefined : stack.index[shown]} />
      <LayerAnnouncer
        text={
          marked
            ? `${spokenBand(stack, marked)} marked. Enter shows only these.`
            : pinned < 0
              ? ""
              : [spokenLayer(stack, pinned), ...tracks.map((track) => trackText(track, pinned)), spoken]
                  .filter((part) => part)
                  .map((part) => `${part}.`)
                  .join(" ")
        }
      />
    </section>
  );
}
