/** Positions of a line in the original and in the tuned file; -1 where it has none. */
export type LinePair = readonly [before: number, after: number];

const OURS = /;ql[+=]?\s*$|^;quenchline /;

/** A line without the number and the checksum that a renumbered file changes on every line. */
const plain = (line: string): string => line.replace(/^\s*N\d+\s*/i, "").replace(/\s*\*\d+\s*$/, "");

/**
 * Which lines of both files correspond. A tuned file is its original, in the same order, without the lines taken out and
 * with ours put in, and ours are marked: one walk over both files finds them.
 */
export function alignLines(before: readonly string[], after: readonly string[]): LinePair[] {
  const pairs: LinePair[] = [];
  let b = 0;
  let a = 0;
  while (b < before.length || a < after.length) {
    if (a < after.length && (OURS.test(after[a]) || b === before.length)) pairs.push([-1, a++]);
    else if (a < after.length && plain(before[b]) === plain(after[a])) pairs.push([b++, a++]);
    else pairs.push([b++, -1]);
  }
  return pairs;
}
