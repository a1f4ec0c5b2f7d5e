import type { LineLook } from "#shared/prove/line-look.ts";

/** How a line of the original stands in the tuned file. */
export type Sameness = "same" | "renumbered" | "other";

/**
 * Compares two lines.
 *
 * @param numbered in a numbered file the digits of number and checksum may differ, but for lines that set the counter
 * @param openEnd the terminator may differ: one of the lines ends its file
 */
export function sameLine(original: LineLook, tuned: LineLook, numbered: boolean, openEnd: boolean): Sameness {
  const equalEnds = openEnd || equal(original, original.textEnd, original.next, tuned, tuned.textEnd, tuned.next);
  if (!equalEnds) return "other";
  if (equal(original, original.start, original.textEnd, tuned, tuned.start, tuned.textEnd)) return "same";
  if (!numbered || !original.numbered || !tuned.numbered || original.counterSet >= 0) return "other";
  const pieces =
    equal(original, original.start, original.numberStart, tuned, tuned.start, tuned.numberStart) &&
    equal(original, original.numberEnd, original.starAt, tuned, tuned.numberEnd, tuned.starAt) &&
    equal(original, original.sumEnd, original.textEnd, tuned, tuned.sumEnd, tuned.textEnd);
  return pieces ? "renumbered" : "other";
}

function equal(a: LineLook, aFrom: number, aTo: number, b: LineLook, bFrom: number, bTo: number): boolean {
  const length = aTo - aFrom;
  if (length !== bTo - bFrom) return false;
  for (let k = 0; k < length; k++) if (a.buf[aFrom + k] !== b.buf[bFrom + k]) return false;
  return true;
}
