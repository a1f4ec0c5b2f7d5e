import type { Track } from "#src/features/layer-log/track.ts";
import { niceStep, type Scale } from "#src/lib/scale.ts";

/** The scale of a track: as it says, else with room for every value and reference. */
export function trackScale({ domain, scale = "linear", series, references = [] }: Track): Scale {
  if (domain) return { kind: scale, from: domain[0], to: domain[1] };
  const { least, leastAboveZero, most } = extremes([
    ...series.flatMap(({ values, low, high }) => [values, low ?? [], high ?? []]),
    references.map(({ value }) => value),
  ]);
  if (scale === "log" && leastAboveZero < Number.POSITIVE_INFINITY) {
    const from = 10 ** Math.floor(Math.log10(leastAboveZero) + 1e-9);
    const to = niceAbove(most);
    return { kind: "log", from, to: to > from ? to : from * 10 };
  }
  if (!(most > Number.NEGATIVE_INFINITY)) return { kind: "linear", from: 0, to: 1 };
  const from = Math.min(0, least);
  const span = most - from || 1;
  const step = niceStep(span, 4);
  return { kind: "linear", from: Math.floor(from / step) * step, to: Math.ceil((from + span) / step - 1e-9) * step };
}

/** 1, 2 or 5 times a power of ten, at least the value. */
function niceAbove(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value) + 1e-9);
  return ([1, 2, 5, 10].find((factor) => factor * power >= value * (1 - 1e-9)) ?? 10) * power;
}

function extremes(lists: readonly ArrayLike<number>[]) {
  let least = Number.POSITIVE_INFINITY;
  let leastAboveZero = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (const values of lists) {
    for (let i = 0; i < values.length; i++) {
      const value = values[i];
      if (value < least) least = value;
      if (value > most) most = value;
      if (value > 0 && value < leastAboveZero) leastAboveZero = value;
    }
  }
  return { least, leastAboveZero, most };
}
