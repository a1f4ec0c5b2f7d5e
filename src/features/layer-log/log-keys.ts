/** What a key does in the layer log. */
export type LogStep = { pin: number } | { zoom: "in" | "out" | "whole" };

/**
 * @param key as in KeyboardEvent.key
 * @param position of the pinned layer, -1 for none
 * @param count number of layers
 * @param page layers that PageUp and PageDown pass over
 * @returns undefined for a key that means nothing here
 */
export function logStep(key: string, position: number, count: number, page: number): LogStep | undefined {
  if (key === "Escape") return { zoom: "whole" };
  if (key === "+" || key === "=") return { zoom: "in" };
  if (key === "-") return { zoom: "out" };
  const target = pinTarget(key, position, count, page);
  return target === undefined || count === 0 ? undefined : { pin: Math.min(Math.max(target, 0), count - 1) };
}

function pinTarget(key: string, position: number, count: number, page: number): number | undefined {
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
