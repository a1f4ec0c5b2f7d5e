import type { Track } from "#src/features/layer-log/track.ts";
import { fixedText } from "#src/lib/number-text.ts";

/** The unit as it follows a number: a duty is a bare number between 0 and 1. */
export const unitAfter = (unit: string): string => (unit === "0–1" ? "" : unit);

/** All values of a track at a layer, as they are read out: "Fan duty as sliced 0.40, as planned 0.55". */
export function trackText({ title, unit, series, decimals = 1 }: Track, position: number): string {
  const named = series.length > 1;
  const values = series.map(({ label, values, low, high, uncertain }) => {
    const text = fixedText(values[position], decimals);
    const value = text === "–" ? "unknown" : [text, unitAfter(unit)].join(" ").trim();
    const between =
      uncertain && low && high && Number.isFinite(low[position])
        ? `, between ${fixedText(low[position], decimals)} and ${fixedText(high[position], decimals)}`
        : "";
    return `${named ? `${label} ` : ""}${value}${between}`;
  });
  return `${title} ${values.join(", ")}`;
}
