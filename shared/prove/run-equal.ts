import type { LineFeed } from "#shared/prove/line-feed.ts";
import type { Watch } from "#shared/prove/watch.ts";

const LF = 10;
const CR = 13;

/**
 * Runs over lines that are equal in both files and cannot be of interest: the hot loop of the proof, one compare and
 * one look-up a byte. It stops at the first byte that differs or that is watched for, with both files at the start of
 * that line, or where one of them needs more bytes.
 *
 * @param original at the same place of its line as `tuned`
 * @returns number of lines that it ran over
 */
export function runEqual(original: LineFeed, tuned: LineFeed, { within, first }: Watch): number {
  const a = original.buf;
  const b = tuned.buf;
  const shift = tuned.pos - original.pos;
  const end = Math.min(original.end, tuned.end - shift);
  let p = original.pos;
  let start = original.start;
  let lines = 0;
  scan: while (p < end) {
    if (p === start && first[a[p]] !== 0) break;
    let c = a[p];
    while (c === b[p + shift] && within[c] === 0) {
      if (++p >= end) break scan;
      c = a[p];
    }
    if (c !== b[p + shift]) break;
    if (c === LF) p++;
    else if (c !== CR || p + 1 >= end) break;
    else if (a[p + 1] !== LF) p++;
    else if (b[p + 1 + shift] === LF) p += 2;
    else break;
    lines++;
    start = p;
  }
  original.start = start;
  original.pos = p;
  tuned.start = start + shift;
  tuned.pos = p + shift;
  return lines;
}
