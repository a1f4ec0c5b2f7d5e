import { useEffect, useRef, useState } from "react";

/** Takes files dropped anywhere on the page. @returns whether files are being dragged over it now */
export function useFileDrop(onFiles: (files: File[]) => void, enabled: boolean): boolean {
  const [over, setOver] = useState(false);
  const latest = useRef(onFiles);
  latest.current = onFiles;
  useEffect(() => {
    if (!enabled) return;
    // Every element under the pointer is entered and left on its own; the page is left when all are.
    let depth = 0;
    const carriesFiles = (event: DragEvent) => event.dataTransfer?.types.includes("Files") === true;
    const enter = (event: DragEvent) => {
      if (!carriesFiles(event)) return;
      depth++;
      setOver(true);
    };
    const leave = (event: DragEvent) => {
      if (carriesFiles(event) && --depth <= 0) reset();
    };
    const allow = (event: DragEvent) => {
      if (carriesFiles(event)) event.preventDefault();
    };
    const take = (event: DragEvent) => {
      if (!carriesFiles(event)) return;
      event.preventDefault();
      reset();
      latest.current([...(event.dataTransfer?.files ?? [])]);
    };
    const reset = () => {
      depth = 0;
      setOver(false);
    };
    const handlers = { dragenter: enter, dragleave: leave, dragover: allow, drop: take };
    const entries = Object.entries(handlers) as [keyof typeof handlers, (event: DragEvent) => void][];
    for (const [name, handler] of entries) window.addEventListener(name, handler);
    return () => {
      for (const [name, handler] of entries) window.removeEventListener(name, handler);
      setOver(false);
    };
  }, [enabled]);
  return over;
}
