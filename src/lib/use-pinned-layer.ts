import { useContext, useEffect, useRef, useState } from "react";
import { UNSAFE_DataRouterContext, useNavigation, useSearchParams } from "react-router-dom";

/** Arrow keys walk fast; the address follows when they rest. */
const REST_MS = 250;

/**
 * The pinned layer, by index, kept in the address so that a link leads to the same layer.
 *
 * @param first pinned to begin with where the address names none; it is not written there
 */
export function usePinnedLayer(first?: number): [layer: number | undefined, pin: (layer: number | undefined) => void] {
  const [search, setSearch] = useSearchParams();
  // While the next page is fetched this one still stands: writing its address then would call the way there off.
  const leaving = useNavigation().state !== "idle";
  const router = useRef(useContext(UNSAFE_DataRouterContext)?.router);
  const [layer, pin] = useState(() => layerIn(search) ?? first);
  const written = layerIn(search);
  const setLater = useRef(setSearch);
  setLater.current = setSearch;
  useEffect(() => {
    if (leaving || layer === written || (written === undefined && layer === first)) return;
    const timer = setTimeout(() => {
      const keep = (now: URLSearchParams) => {
        const next = new URLSearchParams(now);
        if (layer === undefined) next.delete("layer");
        else next.set("layer", String(layer));
        return next;
      };
      // The way to the next page may have begun and not be drawn yet.
      if (router.current && router.current.state.navigation.state !== "idle") return;
      setLater.current(keep, { replace: true, preventScrollReset: true });
    }, REST_MS);
    return () => clearTimeout(timer);
  }, [layer, written, leaving, first]);
  return [layer, pin];
}

function layerIn(search: URLSearchParams): number | undefined {
  const value = Number(search.get("layer"));
  return Number.isInteger(value) && value > 0 ? value : undefined;
}
