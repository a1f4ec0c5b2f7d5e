import { useEffect, useRef, useState } from "react";
import { useLocation, useSearchParams } from "react-router-dom";

/** Arrow keys walk fast; the address follows when they rest. */
const REST_MS = 250;

/** The pinned layer, by index, kept in the address so that a link leads to the same layer. */
export function usePinnedLayer(): [layer: number | undefined, pin: (layer: number | undefined) => void] {
  const [search, setSearch] = useSearchParams();
  const { pathname } = useLocation();
  const [layer, pin] = useState(() => layerIn(search));
  const setLater = useRef(setSearch);
  setLater.current = setSearch;
  useEffect(() => {
    const timer = setTimeout(() => {
      const keep = (now: URLSearchParams) => {
        const next = new URLSearchParams(now);
        if (layer === undefined) next.delete("layer");
        else next.set("layer", String(layer));
        return next;
      };
      // The page may be on its way out: the next one's address is no business of ours.
      if (window.location.pathname !== pathname) return;
      if (layerIn(new URLSearchParams(window.location.search)) !== layer) {
        setLater.current(keep, { replace: true, preventScrollReset: true });
      }
    }, REST_MS);
    return () => clearTimeout(timer);
  }, [layer, pathname]);
  return [layer, pin];
}

function layerIn(search: URLSearchParams): number | undefined {
  const value = Number(search.get("layer"));
  return Number.isInteger(value) && value > 0 ? value : undefined;
}
