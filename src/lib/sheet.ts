import { useSyncExternalStore } from "react";
import type { Sheet } from "#src/ui/sheet-colours.ts";

/** The person's own choice of sheet, or the system's. */
export type SheetChoice = Sheet | "system";

const KEY = "quenchline.sheet";
const dark = window.matchMedia("(prefers-color-scheme: dark)");
const listeners = new Set<() => void>();

export function sheetChoice(): SheetChoice {
  const kept = document.documentElement.dataset.sheet;
  return kept === "light" || kept === "dark" ? kept : "system";
}

/** The sheet that is shown now. */
export function shownSheet(): Sheet {
  const choice = sheetChoice();
  return choice === "system" ? (dark.matches ? "dark" : "light") : choice;
}

export function chooseSheet(choice: SheetChoice): void {
  if (choice === "system") delete document.documentElement.dataset.sheet;
  else document.documentElement.dataset.sheet = choice;
  try {
    if (choice === "system") localStorage.removeItem(KEY);
    else localStorage.setItem(KEY, choice);
  } catch {
    // Storage may be closed to us; the choice then lasts as long as the page.
  }
  for (const listener of listeners) listener();
}

/** Applies what was chosen on an earlier visit. */
export function restoreSheet(): void {
  try {
    const kept = localStorage.getItem(KEY);
    if (kept === "light" || kept === "dark") document.documentElement.dataset.sheet = kept;
  } catch {
    // As above.
  }
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  dark.addEventListener("change", listener);
  return () => {
    listeners.delete(listener);
    dark.removeEventListener("change", listener);
  };
}

export const useSheetChoice = (): SheetChoice => useSyncExternalStore(subscribe, sheetChoice);
export const useShownSheet = (): Sheet => useSyncExternalStore(subscribe, shownSheet);
