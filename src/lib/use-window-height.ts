import { useSyncExternalStore } from "react";

function subscribe(listener: () => void): () => void {
  window.addEventListener("resize", listener);
  return () => window.removeEventListener("resize", listener);
}

/** Height of what is seen of the page, px. */
export const useWindowHeight = (): number => useSyncExternalStore(subscribe, () => window.innerHeight);
