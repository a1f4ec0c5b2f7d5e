import type { HeightRange, HeightView } from "#src/features/layer-log/height-view.ts";
import type { LayerStack } from "#src/features/layer-log/layer-stack.ts";
import type { LogLayout } from "#src/features/layer-log/log-layout.ts";
import type { Palette } from "#src/features/layer-log/palette.ts";
import type { Patterns } from "#src/features/layer-log/patterns.ts";
import type { Section } from "#src/features/layer-log/section.ts";
import type { LogMark, Track } from "#src/features/layer-log/track.ts";
import type { ZoneBand } from "#src/features/layer-log/zone-bands.ts";
import type { Scale } from "#src/lib/scale.ts";
import type { PredictedState } from "#src/lib/state-fill.ts";

/** What the log shows, apart from where the crosshair is. */
export interface LogContent {
  stack: LayerStack;
  section: Section;
  tracks: readonly Track[];
  /** one for every track */
  scales: readonly Scale[];
  bands: readonly ZoneBand[];
  /** the predicted state of every layer; they fill the silhouette in place of the bands' targets */
  states?: readonly PredictedState[];
  marks: readonly LogMark[];
}

/** Where and how it is drawn. */
export interface LogPicture extends LogContent {
  layout: LogLayout;
  view: HeightView;
  /** device pixels per px */
  ratio: number;
  palette: Palette;
  patterns: Patterns;
  /** draws the zones' names in the column at the right; an editor that lies there draws its own */
  bandColumn: boolean;
}

/** What moves with pointer and keyboard. Positions in print order, -1 for none. */
export interface LogPointer {
  pinned: number;
  hovered: number;
  band: HeightRange | undefined;
}

/** Rows above the plot: the scales' numbers. */
export const SCALE_STRIP_PX = 20;
const FOOT_PX = 8;

export function viewOf({ fromMm, toMm }: HeightRange, heightPx: number): HeightView {
  return { fromMm, toMm, topPx: SCALE_STRIP_PX + 4, bottomPx: Math.max(heightPx - FOOT_PX, SCALE_STRIP_PX + 24) };
}
