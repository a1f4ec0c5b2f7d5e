import type { KeyboardEvent } from "react";

/** Ctrl+Z, Ctrl+Shift+Z and Ctrl+Y, in fields too: what is typed is part of the draft. */
export function undoKeys(event: KeyboardEvent, history: { undo(): void; redo(): void }): void {
  if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
  const key = event.key.toLowerCase();
  const step = key === "y" || (key === "z" && event.shiftKey) ? history.redo : key === "z" ? history.undo : undefined;
  if (!step) return;
  event.preventDefault();
  step();
}
