import { type PointerEvent, useRef, useState } from "react";
import { type HeightRange, type HeightView, heightAt } from "#src/features/layer-log/height-view.ts";
import { type LayerStack, positionAtHeight } from "#src/features/layer-log/layer-stack.ts";
import type { Column } from "#src/features/layer-log/log-layout.ts";

interface Options {
  stack: LayerStack;
  view: HeightView;
  silhouette: Column;
  onPin(position: number): void;
  onZoom(range: HeightRange): void;
  onHover(position: number): void;
}

/** Less movement than this is a click. */
const CLICK_PX = 4;

/** Crosshair, clicks, and dragging a band over the silhouette. */
export function useLogPointer({ stack, view, silhouette, onPin, onZoom, onHover }: Options) {
  const [band, setBand] = useState<HeightRange>();
  const start = useRef<{ y: number; x: number; onSilhouette: boolean } | undefined>(undefined);

  const place = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    return { x: event.clientX - box.left, y: event.clientY - box.top };
  };
  const heightOf = (y: number) => Math.min(Math.max(heightAt(view, y), view.fromMm), view.toMm);
  const drop = () => {
    start.current = undefined;
    setBand(undefined);
  };

  return {
    band,
    drop,
    handlers: {
      onPointerMove(event: PointerEvent<HTMLElement>) {
        const { y } = place(event);
        onHover(positionAtHeight(stack, heightOf(y)));
        const from = start.current;
        if (from?.onSilhouette && Math.abs(y - from.y) >= CLICK_PX) {
          setBand({ fromMm: heightOf(from.y), toMm: heightOf(y) });
        }
      },
      onPointerDown(event: PointerEvent<HTMLElement>) {
        if (event.button !== 0) return;
        const { x, y } = place(event);
        const onSilhouette = x >= silhouette.x && x <= silhouette.x + silhouette.width;
        start.current = { x, y, onSilhouette };
        if (onSilhouette) event.currentTarget.setPointerCapture?.(event.pointerId);
      },
      onPointerUp(event: PointerEvent<HTMLElement>) {
        const from = start.current;
        const { x, y } = place(event);
        drop();
        if (!from) return;
        if (band) onZoom({ fromMm: heightOf(from.y), toMm: heightOf(y) });
        else if (Math.hypot(x - from.x, y - from.y) < CLICK_PX) onPin(positionAtHeight(stack, heightOf(y)));
      },
      onPointerCancel: drop,
      onPointerLeave: () => onHover(-1),
    },
  };
}
