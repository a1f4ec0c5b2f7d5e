import type { LineFeed } from "#shared/prove/line-feed.ts";
import type { Watch } from "#shared/prove/watch.ts";

const LF = 10;
const CR = 13;

/**
 * Runs over lines that are equal in both files and cannot be of interest: the hot loop of the proof, one compare and
 * one look-up a byte. It stops at the first byte that differs or that is watched for, with both files at the start of
 * that line, or where one of them needs more bytes.
 *
 * @param original at the start of a line, as is `tuned`
 * @returns number of lines that it ran over
 */
export function runEqual(original: LineFeed, tuned: LineFeed, { within, first }: Watch): number {
  const a = original.buf;
  const b = tuned.buf;
  const shift = tuned.start - original.start;
  const end = Math.min(original.end, tuned.end - shift);
  let start = original.start;
  let p = start;
  let lines = 0;
  while (p < end) {
    if (p === start && first[a[p]] !== 0) break;
    // Four bytes at a time with one branch, as long as they are equal and of no interest.
    for (let q = p + shift; p < end - 3; p += 4, q += 4) {
      const c0 = a[p];
      const c1 = a[p + 1];
      const c2 = a[p + 2];
      const c3 = a[p + 3];
      const differs = (c0 ^ b[q]) | (c1 ^ b[q + 1]) | (c2 ^ b[q + 2]) | (c3 ^ b[q + 3]);
      if ((differs | within[c0] | within[c1] | within[c2] | within[c3]) !== 0) break;
    }
    while (p < end && a[p] === b[p + shift] && within[a[p]] === 0) p++;
    if (p >= end || a[p] !== b[p + shift]) break;
    const c = a[p];
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
