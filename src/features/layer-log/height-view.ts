import type { LayerStack } from "#src/features/layer-log/layer-stack.ts";

/** The part of the height axis that is shown, and the pixels it is shown on. The part grows upward. */
export interface HeightView {
  fromMm: number;
  toMm: number;
  /** pixel rows of `toMm` (top edge) and `fromMm` (bottom edge) */
  topPx: number;
  bottomPx: number;
}

/** A range of heights on the axis, mm. */
export interface HeightRange {
  fromMm: number;
  toMm: number;
}

export function yOf({ fromMm, toMm, topPx, bottomPx }: HeightView, atMm: number): number {
  return bottomPx - ((atMm - fromMm) / (toMm - fromMm)) * (bottomPx - topPx);
}

export function heightAt({ fromMm, toMm, topPx, bottomPx }: HeightView, y: number): number {
  return fromMm + ((bottomPx - y) / (bottomPx - topPx)) * (toMm - fromMm);
}

/** The whole part. */
export function wholeRange({ totalMm }: LayerStack): HeightRange {
  return { fromMm: 0, toMm: totalMm > 0 ? totalMm : 1 };
}

/** Fewest layers a zoom shows. */
const FEWEST = 4;

/** A wanted range moved and widened so that it lies within the part and shows a few layers at least. */
export function fitRange(stack: LayerStack, wanted: HeightRange): HeightRange {
  const whole = wholeRange(stack);
  const least = Math.min(whole.toMm, (FEWEST * whole.toMm) / Math.max(stack.count, FEWEST));
  const [low, high] = wanted.fromMm <= wanted.toMm ? [wanted.fromMm, wanted.toMm] : [wanted.toMm, wanted.fromMm];
  const span = Math.min(Math.max(high - low, least), whole.toMm);
  const middle = (low + high) / 2;
  const from = Math.min(Math.max(span > high - low ? middle - span / 2 : low, 0), whole.toMm - span);
  return { fromMm: from, toMm: from + span };
}

export function isWhole(stack: LayerStack, { fromMm, toMm }: HeightRange): boolean {
  return fromMm <= 0 && toMm >= wholeRange(stack).toMm;
}

/** The range moved, not stretched, just so far that [bottomMm, topMm] is seen; the same object where it is already. */
export function rangeShowing(stack: LayerStack, range: HeightRange, bottomMm: number, topMm: number): HeightRange {
  if (bottomMm >= range.fromMm && topMm <= range.toMm) return range;
  const shift = bottomMm < range.fromMm ? bottomMm - range.fromMm : topMm - range.toMm;
  return fitRange(stack, { fromMm: range.fromMm + shift, toMm: range.toMm + shift });
}

/** The range made `factor` times as tall about a height. */
export function zoomedAbout(stack: LayerStack, range: HeightRange, aboutMm: number, factor: number): HeightRange {
  return fitRange(stack, {
    fromMm: aboutMm - (aboutMm - range.fromMm) * factor,
    toMm: aboutMm + (range.toMm - aboutMm) * factor,
  });
}
