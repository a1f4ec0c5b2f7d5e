import { Refusal } from "#shared/refusal.ts";

const LF = 10;
const CR = 13;
/** Longest line that is read; firmware cuts lines far shorter. */
export const MAX_LINE_BYTES = 1 << 20;

/**
 * Called with complete lines: `buf[from, to)` ends with a line terminator, and one more byte stands behind it. With
 * `open` it is the one last line of a file that ends without a terminator: a line feed is lent to it.
 */
export type LinesHandler = (buf: Uint8Array, from: number, to: number, fileOffset: number, open: boolean) => void;

/**
 * Cuts chunks at line ends. Whole lines are handed on inside the chunk they came in; only the line across a chunk
 * border is copied. A terminator is LF, CRLF or a lone CR. Memory is bounded by the longest line.
 */
export class LineFeeder {
  private readonly onLines: LinesHandler;
  private carry = new Uint8Array(4096);
  private carried = 0;
  private offset = 0;

  constructor(onLines: LinesHandler) {
    this.onLines = onLines;
  }

  /** bytes taken so far */
  get bytes(): number {
    return this.offset + this.carried;
  }

  push(bytes: Uint8Array): void {
    // One kind of array, whatever subclass the platform reads into: the scanner's inner loop stays monomorphic.
    const chunk = new Uint8Array(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    // No piece is longer than the longest line, so that a longer line is met by `keep` however the file was cut.
    for (let at = 0; at < chunk.length; at += MAX_LINE_BYTES) this.pushPiece(chunk.subarray(at, at + MAX_LINE_BYTES));
  }

  private pushPiece(chunk: Uint8Array): void {
    if (this.carried > 0 && this.carry[this.carried - 1] === CR && chunk[0] !== LF) this.flush();
    const end = lastLineEnd(chunk);
    if (end === 0) {
      this.keep(chunk);
      return;
    }
    let from = 0;
    if (this.carried > 0) {
      from = firstLineEnd(chunk);
      this.keep(chunk.subarray(0, from));
      this.flush();
    }
    if (end > from) {
      this.onLines(chunk, from, end, this.offset, false);
      this.offset += end - from;
    }
    this.keep(chunk.subarray(end));
  }

  /** Hands on the last line. Returns false when it had no terminator: one is then lent to it. */
  end(): boolean {
    const lineStart = this.carry.subarray(0, this.carried).lastIndexOf(CR) + 1;
    const rest = this.carry.slice(lineStart, this.carried);
    this.carried = lineStart;
    if (lineStart > 0) this.flush();
    if (rest.length === 0) return true;
    const line = new Uint8Array(rest.length + 2);
    line.set(rest);
    line[rest.length] = LF;
    this.onLines(line, 0, rest.length + 1, this.offset, true);
    this.offset += rest.length;
    return false;
  }

  private flush(): void {
    this.room(1);
    this.carry[this.carried] = 0;
    const length = this.carried;
    this.carried = 0;
    this.onLines(this.carry, 0, length, this.offset, false);
    this.offset += length;
  }

  private keep(piece: Uint8Array): void {
    if (piece.length === 0) return;
    this.room(piece.length);
    this.carry.set(piece, this.carried);
    this.carried += piece.length;
    if (this.carried > MAX_LINE_BYTES)
      throw new Refusal(
        "not-gcode",
        `a line longer than ${MAX_LINE_BYTES >> 20} MiB at byte ${this.offset}: this is not text G-code`,
        "Send the sliced G-code file as text.",
      );
  }

  private room(extra: number): void {
    if (this.carried + extra < this.carry.length) return;
    const wider = new Uint8Array(Math.max(this.carry.length * 2, this.carried + extra + 1));
    wider.set(this.carry.subarray(0, this.carried));
    this.carry = wider;
  }
}

/** End of the last line that is surely complete; a CR at the very end may be half of a CRLF. 0 when there is none. */
function lastLineEnd(chunk: Uint8Array): number {
  const lf = chunk.lastIndexOf(LF);
  if (lf >= 0) return lf + 1;
  if (chunk.length < 2) return 0;
  return chunk.lastIndexOf(CR, chunk.length - 2) + 1;
}

/** End of the first line; called only where the chunk holds one. */
function firstLineEnd(chunk: Uint8Array): number {
  let p = 0;
  while (chunk[p] !== LF && (chunk[p] !== CR || p === chunk.length - 1)) p++;
  return chunk[p] === CR && chunk[p + 1] === LF ? p + 2 : p + 1;
}
