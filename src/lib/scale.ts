import { fixedText } from "#src/lib/number-text.ts";

/** Numbers along an axis of a drawing: positions, and where marks with readable values stand. */

/** The step of 1, 2 or 5 times a power of ten that cuts a span into at most `most` parts. */
export function niceStep(span: number, most: number): number {
  if (!(span > 0) || !(most >= 1)) return 1;
  const least = span / most;
  const power = 10 ** Math.floor(Math.log10(least));
  // A step that is short by a rounding error only would double the number of marks.
  const step = [1, 2, 5, 10].find((factor) => factor * power >= least * (1 - 1e-9)) ?? 10;
  return step * power;
}

/** Multiples of the step within [from, to], each as exact as a decimal can be. */
export function multiples(from: number, to: number, step: number): number[] {
  const decimals = decimalsOf(step);
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  const found: number[] = [];
  for (let i = first; i <= last; i++) found.push(Number((i * step).toFixed(decimals)) + 0);
  return found;
}

/** How many decimals the multiples of a step need. */
export function decimalsOf(step: number): number {
  return Math.min(Math.max(0, -Math.floor(Math.log10(step) + 1e-9)), 9);
}

/** Powers of ten within [from, to], both > 0. */
export function decades(from: number, to: number): number[] {
  const found: number[] = [];
  for (let power = Math.ceil(Math.log10(from) - 1e-9); 10 ** power <= to * (1 + 1e-9); power++) found.push(10 ** power);
  return found;
}

export interface Scale {
  kind: "linear" | "log";
  /** values at position 0 and 1 */
  from: number;
  to: number;
}

/** Share of the axis at which a value lies, 0-1 for values within the scale; NaN for a value that is no number. */
export function shareOf({ kind, from, to }: Scale, value: number): number {
  if (kind === "linear") return (value - from) / (to - from);
  return value > 0 ? Math.log(value / from) / Math.log(to / from) : value === 0 ? 0 : Number.NaN;
}

/** The value at a share of the axis. */
export function valueAt({ kind, from, to }: Scale, share: number): number {
  return kind === "linear" ? from + share * (to - from) : from * (to / from) ** share;
}

/**
 * Values at which marks stand: at most about `most`, on a logarithmic axis its decades.
 *
 * @param most at least 2, so that a scale can be told
 */
export function marksOf({ kind, from, to }: Scale, most: number): { value: number; text: string }[] {
  if (kind === "log") return decades(from, to).map((value) => ({ value, text: fixedText(value, decimalsOf(value)) }));
  const step = niceStep(to - from, Math.max(most, 2));
  return multiples(from, to, step).map((value) => ({ value, text: fixedText(value, decimalsOf(step)) }));
}
