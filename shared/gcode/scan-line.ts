const LF = 10;
const CR = 13;
const TAB = 9;
const SPACE = 32;
/** classes of bytes that start no word */
const BLANK = 253;
const END = 254;
const OTHER = 255;
const G = 6;
const M = 12;
const N = 13;
/**
 * The byte scanner: one line of G-code to numbers, without making a string.
 *
 * A line is `[N…] words [*checksum] [comment]`, a named command (`NAME KEY=value …`), a message command whose rest is
 * text, or something that cannot be read. Words are a letter and a number (RS274/NGC, NISTIR 6556, section 3.3):
 * either case, blanks anywhere outside comments, a sign, an optional point, no exponent (an `E` starts a word).
 * Numbers are gathered as one integer and divided once by a power of ten: both are exact below 2^53, so the quotient
 * is the correctly rounded value of the decimal.
 */

/** What a line turned out to be. */
export const LineKind = { blank: 0, words: 1, named: 2, text: 3, unreadable: 4 } as const;

/** Bit of a letter in `LineScan.mask`; `A` is bit 0. */
export const bit = (letter: string): number => 1 << (letter.charCodeAt(0) - 65);

/** The result of one scan; the same object is filled again for every line. */
export class LineScan {
  /** one of LineKind */
  kind = 0;
  /** letters present, one bit each */
  mask = 0;
  /** letters that stood without a number, e.g. the X of `G28 X` */
  bare = 0;
  /** letters that stood more than once; the last number is kept */
  repeated = 0;
  /** number of G and M words; more than one means several commands on a line */
  commands = 0;
  /** first byte of the first word or name, and the byte after the last of them (comment and checksum excluded) */
  codeStart = 0;
  codeEnd = 0;
  /** inside of the first comment, delimiters excluded; -1 when there is none */
  commentStart = -1;
  commentEnd = -1;
  /** checksum behind `*`, or -1; and where the star stands */
  checksum = -1;
  starAt = -1;
  /** start of the line, its end without terminator, and the start of the next line, all as places in the buffer */
  start = 0;
  textEnd = 0;
  next = 0;
  /** 1-based number of the line in the file, counted by the caller */
  line = 0;
  /** lines so far that ended in CR LF */
  crlf = 0;
  /** the line was a plain G0 or G1 move: all fields but mask, textEnd and next hold what that implies */
  plain = false;
  /** value of each letter; meaningful only where its bit is set in `mask` and clear in `bare` */
  readonly value = new Float64Array(26);
  /** the first eight G words, in order, and their number */
  readonly gWords = new Float64Array(8);
  gCount = 0;
  /** the M words in order, and their number; a line with more than eight can't be read */
  readonly mWords = new Float64Array(8);
  mCount = 0;

  /** Sets what is the same for all plain moves; `codeStart`, `codeEnd` and `gWords` are not kept for them. */
  makePlain(g: number): void {
    this.plain = true;
    this.kind = LineKind.words;
    this.bare = 0;
    this.repeated = 0;
    this.commands = 1;
    this.gCount = 1;
    this.gWords[0] = g;
    this.mCount = 0;
    this.commentStart = -1;
    this.starAt = -1;
    this.checksum = -1;
  }
}

/** 0-25 for a letter in either case, else the byte's class. */
const CLASS = new Uint8Array(256).fill(OTHER);
for (let k = 0; k < 26; k++) {
  CLASS[65 + k] = k;
  CLASS[97 + k] = k;
}
CLASS[SPACE] = BLANK;
CLASS[TAB] = BLANK;
CLASS[LF] = END;
CLASS[CR] = END;
/** Bits of X Y Z E F, in either case, by byte; 0 for all other bytes. */
const AXIS_BIT = new Int32Array(256);
for (const letter of "XYZEF") {
  AXIS_BIT[letter.charCodeAt(0)] = bit(letter);
  AXIS_BIT[letter.toLowerCase().charCodeAt(0)] = bit(letter);
}
const POW10 = Float64Array.from({ length: 23 }, (_, k) => 10 ** k);

/** M commands whose rest of line is a message or a file name. */
const TEXT_COMMANDS = new Set([0, 1, 16, 23, 28, 30, 32, 36, 38, 98, 117, 118, 486, 550, 551, 552, 587, 928]);

/**
 * Scans the line that starts at `start`. The buffer must hold a line feed or carriage return at or after `start`, and
 * one more byte behind a final carriage return.
 *
 * @returns offset of the next line
 */
export function scanLine(buf: Uint8Array, start: number, out: LineScan): number {
  out.start = start;
  if (scanPlainMove(buf, start, out)) return out.next;
  out.plain = false;
  const value = out.value;
  const classes = CLASS;
  const powers = POW10;
  let p = start;
  let mask = 0;
  let bare = 0;
  let repeated = 0;
  let commands = 0;
  let gCount = 0;
  let mCount = 0;
  let codeStart = start;
  let codeEnd = start;
  out.commentStart = -1;
  out.starAt = -1;
  out.kind = LineKind.words;

  let c = buf[p];
  for (;;) {
    let letter = classes[c];
    while (letter === BLANK) {
      c = buf[++p];
      letter = classes[c];
    }
    if (letter >= BLANK) {
      if (letter === END) break;
      p = scanOther(buf, p, out, mask);
      if (out.kind !== LineKind.words) break;
      c = buf[p];
      continue;
    }

    if (mask === 0) codeStart = p;
    const wordStart = p;
    c = buf[++p];
    let negative = false;
    if (c < 48) {
      while (c === SPACE || c === TAB) c = buf[++p];
      if (c === 45) {
        negative = true;
        c = buf[++p];
      } else if (c === 43) c = buf[++p];
    }
    const digits = p;
    let whole = 0;
    let d = c - 48;
    while (d >>> 0 <= 9) {
      whole = (Math.imul(whole, 10) + d) | 0;
      c = buf[++p];
      d = c - 48;
    }
    let read = p - digits;
    let number = whole;
    if (c === 46) {
      const fraction = p + 1;
      c = buf[++p];
      d = c - 48;
      while (d >>> 0 <= 9) {
        whole = (Math.imul(whole, 10) + d) | 0;
        c = buf[++p];
        d = c - 48;
      }
      read += p - fraction;
      number = whole / powers[(p - fraction) & 15];
    }
    // Nine digits fit an int32; more, or a blank inside the number, take the careful way. What follows an M word after
    // a blank is never more of its number: `M117 5 layers left`.
    if (read > 9 || (classes[c] === BLANK && buf[p + 1] < 65 && letter !== M && continuesNumber(buf, p))) {
      p = scanLongNumber(buf, digits);
      c = buf[p];
      number = longNumber;
      read = longDigits;
    }

    const wordBit = 1 << letter;
    if (read === 0) {
      if ((mask & ~(1 << N)) === 0 && startsName(buf, wordStart)) {
        out.codeStart = wordStart;
        out.kind = LineKind.named;
        p = scanNamed(buf, wordStart, out, mask !== 0);
        break;
      }
      bare |= wordBit;
    }
    if ((mask & wordBit) !== 0 && letter !== G) repeated |= wordBit;
    mask |= wordBit;
    value[letter] = negative ? -number : number;
    codeEnd = p;

    if (letter === G) {
      commands++;
      out.gWords[gCount & 7] = number;
      gCount++;
    } else if (letter === M) {
      commands++;
      out.mWords[mCount & 7] = number;
      mCount++;
      if (commands === 1 && TEXT_COMMANDS.has(number)) {
        out.kind = LineKind.text;
        p = endOfText(buf, p, out, (mask & (1 << N)) !== 0);
        break;
      }
    }
  }

  if (out.kind === LineKind.words) {
    if (mask === 0) out.kind = LineKind.blank;
    else if (mCount > out.mWords.length) out.kind = LineKind.unreadable;
    out.codeEnd = codeEnd;
  }
  if (out.kind !== LineKind.named) out.codeStart = codeStart;
  out.mask = mask;
  out.bare = bare;
  out.repeated = repeated;
  out.commands = commands;
  out.gCount = gCount;
  out.mCount = mCount;
  if (buf[p] !== LF && buf[p] !== CR) p = endOfLine(buf, p);
  out.textEnd = p;
  const pair = buf[p] === CR && buf[p + 1] === LF;
  if (pair) out.crlf++;
  const next = pair ? p + 2 : p + 1;
  out.next = next;
  return next;
}

/**
 * The shape that nearly all lines have: `G0` or `G1`, words of X Y Z E F, each once, with numbers of up to nine digits,
 * and the line's end. Anything else is left to the general way, which reads these lines too, only slower.
 */
function scanPlainMove(buf: Uint8Array, start: number, out: LineScan): boolean {
  if ((buf[start] | 32) !== 103) return false;
  let p = start + 1;
  if (buf[p] === 48 && (buf[p + 1] & 0xfe) === 48) p++; // G00, G01
  const g = buf[p] - 48;
  if (g >>> 0 > 1) return false;
  const value = out.value;
  const powers = POW10;
  const axes = AXIS_BIT;
  let mask = 1 << G;
  let c = buf[++p];
  for (;;) {
    while (c === SPACE) c = buf[++p];
    const wordBit = axes[c];
    if ((mask & wordBit) !== 0 || wordBit === 0) break;
    const letter = (c & 31) - 1;
    c = buf[++p];
    const negative = c === 45;
    if (negative) c = buf[++p];
    const digits = p;
    let whole = 0;
    let d = c - 48;
    while (d >>> 0 <= 9) {
      whole = (Math.imul(whole, 10) + d) | 0;
      c = buf[++p];
      d = c - 48;
    }
    let number = whole;
    let read = p - digits;
    if (c === 46) {
      const fraction = p + 1;
      c = buf[++p];
      d = c - 48;
      while (d >>> 0 <= 9) {
        whole = (Math.imul(whole, 10) + d) | 0;
        c = buf[++p];
        d = c - 48;
      }
      read += p - fraction;
      number = whole / powers[(p - fraction) & 15];
    }
    if ((read - 1) >>> 0 > 8) return false;
    value[letter] = negative ? -number : number;
    mask |= wordBit;
  }
  if (c !== LF) {
    if (c !== CR || buf[p + 1] !== LF) return false;
    out.crlf++;
    out.next = p + 2;
  } else out.next = p + 1;
  value[G] = g;
  out.mask = mask;
  out.textEnd = p;
  if (!out.plain) out.makePlain(g);
  return true;
}

/** Comments, checksums and everything that is not a word. Returns where to go on; sets `kind` where nothing can follow. */
function scanOther(buf: Uint8Array, start: number, out: LineScan, mask: number): number {
  const c = buf[start];
  if (c === 59) {
    const end = endOfLine(buf, start);
    keepComment(out, start + 1, end);
    return end;
  }
  if (c === 40) return scanParenthesis(buf, start, out);
  if (c === 42 && out.starAt < 0) {
    let p = start + 1;
    let sum = 0;
    while (buf[p] >= 48 && buf[p] <= 57 && p < start + 5) sum = sum * 10 + buf[p++] - 48;
    out.starAt = start;
    out.checksum = p > start + 1 ? sum : -1;
    return p;
  }
  if (c === 37 && mask === 0) return endOfLine(buf, start); // `%` frames a program
  if (c === 64 && mask === 0) {
    out.codeStart = start;
    out.kind = LineKind.named; // `@…` speaks to the host
    return scanNamed(buf, start, out, false);
  }
  out.kind = LineKind.unreadable;
  return endOfLine(buf, start);
}

function keepComment(out: LineScan, start: number, end: number): void {
  if (out.commentStart >= 0) return;
  out.commentStart = start;
  out.commentEnd = end;
}

/** A comment in parentheses may nest (common practice, no source; RS274/NGC forbids it); unclosed, it runs to the line's end. */
function scanParenthesis(buf: Uint8Array, start: number, out: LineScan): number {
  let depth = 1;
  let p = start + 1;
  for (; ; p++) {
    const c = buf[p];
    if (c === LF || c === CR) break;
    if (c === 40) depth++;
    else if (c === 41 && --depth === 0) break;
  }
  keepComment(out, start + 1, p);
  return depth === 0 ? p + 1 : p;
}

/** The first terminator from `start` on; the end of the buffer where a caller broke the rule that there is one. */
function endOfLine(buf: Uint8Array, start: number): number {
  let p = start;
  while (p < buf.length && buf[p] !== LF && buf[p] !== CR) p++;
  return p;
}

/** End of a message: the line's end, or the checksum of a numbered line. */
function endOfText(buf: Uint8Array, start: number, out: LineScan, numbered: boolean): number {
  const end = endOfLine(buf, start);
  takeChecksum(buf, start, end, out, numbered);
  return end;
}

/** Ends the code at `end`, or at the checksum of a numbered line that stands there. */
function takeChecksum(buf: Uint8Array, start: number, end: number, out: LineScan, numbered: boolean): void {
  out.codeEnd = end;
  if (!numbered) return;
  let last = end;
  while (last > start && (buf[last - 1] === SPACE || buf[last - 1] === TAB)) last--;
  let star = last - 1;
  while (star > start && buf[star] >= 48 && buf[star] <= 57) star--;
  if (star === last - 1 || buf[star] !== 42) return;
  out.starAt = star;
  out.checksum = 0;
  for (let k = star + 1; k < Math.min(last, star + 5); k++) out.checksum = out.checksum * 10 + buf[k] - 48;
  out.codeEnd = star;
}

/** A name starts with a letter and goes on with a letter or underscore, without a blank between. */
function startsName(buf: Uint8Array, start: number): boolean {
  const c = buf[start + 1];
  return CLASS[c] < BLANK || c === 95;
}

/** Runs over a named command: quoted values may hold `;`. Leaves the comment, if any, in `out`. */
function scanNamed(buf: Uint8Array, start: number, out: LineScan, numbered: boolean): number {
  let quote = 0;
  let p = start;
  for (; ; p++) {
    const c = buf[p];
    if (c === LF || c === CR) break;
    if (quote !== 0) {
      if (c === quote) quote = 0;
    } else if (c === 34 || c === 39) quote = c;
    else if (c === 59) break;
  }
  takeChecksum(buf, start, p, out, numbered);
  if (buf[p] !== 59) return p;
  const end = endOfLine(buf, p);
  keepComment(out, p + 1, end);
  return end;
}

/** Whether blanks at `p` are followed by more of the same number: `+0. 12 34` (RS274/NGC, 3.3). */
function continuesNumber(buf: Uint8Array, start: number): boolean {
  let p = start;
  while (buf[p] === SPACE || buf[p] === TAB) p++;
  const c = buf[p];
  return (c >= 48 && c <= 57) || c === 46;
}

let longNumber = 0;
let longDigits = 0;

/** Any number of digits, with blanks among them; leaves the value in `longNumber` and the count in `longDigits`. */
function scanLongNumber(buf: Uint8Array, start: number): number {
  let p = start;
  let mantissa = 0;
  let scale = -1;
  let significant = 0;
  let text = "";
  longDigits = 0;
  for (; ; p++) {
    const c = buf[p];
    if (c >= 48 && c <= 57) {
      longDigits++;
      if (significant > 0 || c !== 48) significant++;
      mantissa = mantissa * 10 + (c - 48);
      if (scale >= 0) scale++;
      if (text.length < 400 && (significant > 0 || scale >= 0)) text += String.fromCharCode(c);
    } else if (c === 46 && scale < 0) {
      scale = 0;
      text += ".";
    } else if (c !== SPACE && c !== TAB) break;
  }
  // Beyond fifteen digits the integer is no longer exact: let the language's own parser round correctly.
  longNumber = significant <= 15 && scale <= 22 ? mantissa / POW10[Math.max(scale, 0)] : Number(text);
  return p;
}
