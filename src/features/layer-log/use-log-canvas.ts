import { type RefObject, useEffect, useLayoutEffect, useRef, useState } from "react";
import { drawLog, drawLogPointer } from "#src/features/layer-log/draw-log.ts";
import type { HeightView } from "#src/features/layer-log/height-view.ts";
import type { LogLayout } from "#src/features/layer-log/log-layout.ts";
import type { LogContent, LogPicture, LogPointer } from "#src/features/layer-log/log-picture.ts";
import { type Palette, readPalette } from "#src/features/layer-log/palette.ts";
import { makePatterns, type Patterns } from "#src/features/layer-log/patterns.ts";
import { useShownSheet } from "#src/lib/sheet.ts";

interface LogDrawing {
  content: LogContent;
  layout: LogLayout;
  view: HeightView;
  heightPx: number;
  bandColumn: boolean;
  pointer: LogPointer;
}

interface Inks {
  palette: Palette;
  patterns: Patterns;
  ratio: number;
}

/**
 * Draws the log on one canvas and the crosshair on another above it, at most once a frame each, sharp at any pixel
 * ratio, in the colours of the sheet that is shown.
 */
export function useLogCanvas(
  log: RefObject<HTMLCanvasElement | null>,
  pointerLayer: RefObject<HTMLCanvasElement | null>,
  drawing: LogDrawing,
): void {
  const { content, layout, view, heightPx, bandColumn, pointer } = drawing;
  const inks = useInks(log);
  const latest = useRef<LogPicture | undefined>(undefined);

  useLayoutEffect(() => {
    latest.current = inks && { ...content, ...inks, layout, view, bandColumn };
    return nextFrame(() => {
      const context = latest.current && prepared(log.current, latest.current, heightPx);
      if (latest.current && context) drawLog(context, latest.current, heightPx);
    });
  }, [log, content, layout, view, heightPx, bandColumn, inks]);

  // biome-ignore lint/correctness/useExhaustiveDependencies: the crosshair is drawn again with the log under it
  useLayoutEffect(
    () =>
      nextFrame(() => {
        const context = latest.current && prepared(pointerLayer.current, latest.current, heightPx);
        if (latest.current && context) drawLogPointer(context, latest.current, heightPx, pointer);
      }),
    [pointerLayer, pointer, content, layout, view, heightPx, bandColumn, inks],
  );
}

/** Colours and hatches, made again with the sheet, the pixel ratio and once the numbers' face has arrived. */
function useInks(log: RefObject<HTMLCanvasElement | null>): Inks | undefined {
  const sheet = useShownSheet();
  const ratio = usePixelRatio();
  const [fonts, setFonts] = useState(0);
  const [inks, setInks] = useState<Inks>();
  useEffect(() => {
    let gone = false;
    Promise.all([document.fonts?.load('11px "JetBrains Mono"'), document.fonts?.load('600 11px "JetBrains Mono"')])
      .then(() => !gone && setFonts((n) => n + 1))
      // A face that can't be fetched leaves the system's; the log is drawn with that already.
      .catch(() => undefined);
    return () => {
      gone = true;
    };
  }, []);
  // biome-ignore lint/correctness/useExhaustiveDependencies: sheet and fonts change what is read, not what is called
  useLayoutEffect(() => {
    const context = log.current?.getContext("2d");
    if (!log.current || !context) return;
    const palette = readPalette(log.current);
    setInks({ palette, patterns: makePatterns(context, palette, ratio), ratio });
  }, [log, sheet, ratio, fonts]);
  return inks;
}

function usePixelRatio(): number {
  const [ratio, setRatio] = useState(() => window.devicePixelRatio || 1);
  useEffect(() => {
    const media = window.matchMedia(`(resolution: ${ratio}dppx)`);
    const changed = () => setRatio(window.devicePixelRatio || 1);
    media.addEventListener("change", changed);
    return () => media.removeEventListener("change", changed);
  }, [ratio]);
  return ratio;
}

/** The canvas in the size of its box in device pixels, ready to draw on. */
function prepared(canvas: HTMLCanvasElement | null, { layout, ratio }: LogPicture, heightPx: number) {
  const context = canvas?.getContext("2d");
  if (!canvas || !context) return undefined;
  const [width, height] = [Math.round(layout.width * ratio), Math.round(heightPx * ratio)];
  // Setting the size empties the canvas even where nothing changes.
  if (canvas.width !== width || canvas.height !== height) Object.assign(canvas, { width, height });
  return context;
}

function nextFrame(draw: () => void): () => void {
  const frame = requestAnimationFrame(draw);
  return () => cancelAnimationFrame(frame);
}
