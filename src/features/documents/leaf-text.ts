import type { Leaf } from "#src/features/documents/differences.ts";
import { choiceText } from "#src/lib/document-words.ts";
import { aligned } from "#src/lib/format.ts";
import { fixedText } from "#src/lib/number-text.ts";

/** A curve's points: [x, duty]. */
export type Points = readonly (readonly [number, number])[];

export function asPoints(leaf: Leaf | undefined): Points | undefined {
  if (!Array.isArray(leaf)) return undefined;
  const isPair = (entry: unknown) =>
    Array.isArray(entry) && entry.length === 2 && entry.every((value) => typeof value === "number");
  return leaf.every(isPair) ? (leaf as unknown as Points) : undefined;
}

/** Decimals a number needs to be told apart from its neighbours. */
export function decimalsOf(leaf: Leaf | undefined): number {
  return typeof leaf === "number" ? (String(leaf).split(".")[1]?.length ?? 0) : 0;
}

/** @param decimals of both sides of the row; upTo: of the column, so that points stand one under the other */
export function leafText(leaf: Leaf, decimals: number, upTo: number): string {
  if (typeof leaf === "number") return aligned(leaf, decimals, upTo);
  if (typeof leaf === "boolean") return leaf ? "yes" : "no";
  if (typeof leaf === "string") return leaf === "" ? "empty" : choiceText(leaf);
  if (leaf === null) return "none";
  const points = asPoints(leaf);
  return points ? points.map(([x, y]) => `${fixedText(y, 2)} at ${x}`).join(", ") : JSON.stringify(leaf);
}
