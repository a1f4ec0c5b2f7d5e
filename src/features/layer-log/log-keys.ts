/** What a key does in the layer log. */
export type LogStep =
  | { pin: number }
  /** the band that is marked with the keys reaches up to this layer */
  | { mark: number }
  | { zoom: "in" | "out" | "band" }
  /** one step out of what one is in: a marked band, a zoomed view, a pinned layer */
  | { back: true };

export interface LogKey {
  /** as in KeyboardEvent.key */
  key: string;
  shiftKey: boolean;
}

/** Where the log is when a key is pressed; positions in print order, -1 for none. */
export interface LogKeyPlace {
  pinned: number;
  /** end of the band that is being marked */
  marked: number;
  /** number of layers */
  count: number;
  /** layers that PageUp and PageDown pass over */
  page: number;
}

/** @returns undefined for a key that means nothing here */
export function logStep({ key, shiftKey }: LogKey, { pinned, marked, count, page }: LogKeyPlace): LogStep | undefined {
  if (key === "Escape") return { back: true };
  if (key === "+" || key === "=") return { zoom: "in" };
  if (key === "-") return { zoom: "out" };
  if (key === "Enter") return marked < 0 ? undefined : { zoom: "band" };
  const target = layerFor(key, shiftKey && marked >= 0 ? marked : pinned, count, page);
  if (target === undefined || count === 0) return undefined;
  const position = Math.min(Math.max(target, 0), count - 1);
  return shiftKey ? { mark: position } : { pin: position };
}

function layerFor(key: string, position: number, count: number, page: number): number | undefined {
  // With nothing pinned, the first step up lands on the first layer and the first step down on the last.
  const from = position < 0 ? undefined : position;
  switch (key) {
    case "ArrowUp":
    case "ArrowRight":
      return from === undefined ? 0 : from + 1;
    case "ArrowDown":
    case "ArrowLeft":
      return from === undefined ? count - 1 : from - 1;
    case "PageUp":
      return (from ?? -1) + page;
    case "PageDown":
      return (from ?? count) - page;
    case "Home":
      return 0;
    case "End":
      return count - 1;
    default:
      return undefined;
  }
}
