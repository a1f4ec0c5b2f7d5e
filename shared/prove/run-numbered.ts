import type { LineFeed } from "#shared/prove/line-feed.ts";
import type { LineNumbers } from "#shared/prove/line-numbers.ts";
import type { Watch } from "#shared/prove/watch.ts";

const LF = 10;
const CR = 13;
const STAR = 42;

/** What a run over a numbered file has passed. */
export interface NumberedRun {
  /** lines that are equal byte for byte */
  same: number;
  /** lines that differ in number and checksum only */
  renumbered: number;
}

/**
 * The hot loop for numbered files: runs over lines that are equal but for the digits of number and checksum, with the
 * checksum right and the number following the one before. Any other line is left to a closer look, with both files at
 * its start.
 *
 * @param plain bytes that end what is plain in a numbered line
 */
export function runNumbered(
  original: LineFeed,
  tuned: LineFeed,
  { within, first }: Watch,
  plain: Uint8Array,
  numbers: LineNumbers,
): NumberedRun {
  const a = original.buf;
  const b = tuned.buf;
  const endA = original.end;
  const endB = tuned.end;
  const run = { same: 0, renumbered: 0 };
  for (;;) {
    let p = original.start;
    let q = tuned.start;
    if (p >= endA || q >= endB) return run;
    let c = a[p];
    let sum = 0;
    let number = -1;
    let differs = false;
    if (c === 78 || c === 110) {
      if (b[q] !== c) return run;
      sum = c;
      c = a[++p];
      q++;
      while (p < endA && q < endB && c === 32 && b[q] === 32) {
        sum ^= 32;
        c = a[++p];
        q++;
      }
      const digitsA = p;
      const digitsB = q;
      let given = 0;
      for (; p < endA && a[p] >= 48 && a[p] <= 57; p++) given = given * 10 + a[p] - 48;
      number = 0;
      for (; q < endB && b[q] >= 48 && b[q] <= 57; q++) {
        number = number * 10 + b[q] - 48;
        sum ^= b[q];
      }
      if (p === digitsA || q === digitsB) return run;
      differs = given !== number || p - digitsA !== q - digitsB;
      while (p < endA && q < endB && a[p] === 32 && b[q] === 32) {
        sum ^= 32;
        p++;
        q++;
      }
    }
    if (p >= endA || q >= endB || first[a[p]] !== 0) return run;
    const stops = number < 0 ? within : plain;
    c = a[p];
    while (c === b[q] && stops[c] === 0) {
      sum ^= c;
      q++;
      if (++p >= endA || q >= endB) return run;
      c = a[p];
    }
    if (c !== b[q]) return run;
    if (number >= 0) {
      // A numbered line without a checksum, or with a comment before it, is looked at closely.
      if (c !== STAR || !numbers.follows(number)) return run;
      let given = 0;
      let written = 0;
      const digitsA = ++p;
      const digitsB = ++q;
      for (; p < endA && a[p] >= 48 && a[p] <= 57; p++) given = given * 10 + a[p] - 48;
      for (; q < endB && b[q] >= 48 && b[q] <= 57; q++) written = written * 10 + b[q] - 48;
      if (p >= endA || q >= endB || a[p] !== b[q] || written !== sum || q === digitsB) return run;
      differs ||= given !== written || p - digitsA !== q - digitsB;
      c = a[p];
    }
    if (c === LF) {
      p++;
      q++;
    } else {
      if (c !== CR || p + 1 >= endA || q + 1 >= endB || a[p + 1] !== LF || b[q + 1] !== LF) return run;
      p += 2;
      q += 2;
    }
    if (number >= 0) {
      numbers.last = number;
      if (numbers.edited) numbers.followed++;
    }
    if (differs) run.renumbered++;
    else run.same++;
    original.start = p;
    original.pos = p;
    tuned.start = q;
    tuned.pos = q;
  }
}
