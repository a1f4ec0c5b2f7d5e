import { useMemo } from "react";
import { stackLayers } from "#src/features/layer-log/layer-stack.ts";
import type { LogContent } from "#src/features/layer-log/log-picture.ts";
import type { LogLayer } from "#src/features/layer-log/reading-tracks.ts";
import { sectionOf } from "#src/features/layer-log/section.ts";
import type { LogMark, Track } from "#src/features/layer-log/track.ts";
import { trackScale } from "#src/features/layer-log/track-scale.ts";
import { type BandZone, zoneBands } from "#src/features/layer-log/zone-bands.ts";
import type { PredictedState } from "#src/lib/state-fill.ts";

/** What the log shows, each part computed again only when what it comes from changes. */
export function useLogContent(
  layers: readonly LogLayer[],
  tracks: readonly Track[],
  zones: readonly BandZone[],
  marks: readonly LogMark[],
  states: readonly PredictedState[] | undefined,
): LogContent {
  const stack = useMemo(() => stackLayers(layers), [layers]);
  const section = useMemo(() => sectionOf(layers), [layers]);
  const scales = useMemo(() => tracks.map(trackScale), [tracks]);
  const bands = useMemo(() => zoneBands(zones, stack), [zones, stack]);
  return useMemo(
    () => ({ stack, section, tracks, scales, bands, marks, states }),
    [stack, section, tracks, scales, bands, marks, states],
  );
}
