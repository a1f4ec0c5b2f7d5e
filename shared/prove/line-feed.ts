import { MAX_LINE_BYTES } from "#shared/gcode/line-feeder.ts";

const LF = 10;
const CR = 13;

/**
 * A file as a window of bytes that moves on with the current line. Bytes from `start` on are held, so that a line can be
 * looked at as a whole wherever the chunks were cut; memory is bounded by a chunk and the longest line.
 */
export class LineFeed {
  buf = new Uint8Array(0);
  /** first byte of the current line in `buf` */
  start = 0;
  /** bytes of the current line before this one are known to hold no end of it */
  pos = 0;
  /** byte after the last one that is there; a line feed stands behind it once the file has ended */
  end = 0;
  /** the current line, once `complete` has found it: end without and with its terminator */
  textEnd = 0;
  next = 0;

  private readonly source: AsyncIterator<Uint8Array>;
  private ended = false;
  private base = 0;

  constructor(source: AsyncIterable<Uint8Array>) {
    this.source = source[Symbol.asyncIterator]();
  }

  /** byte of the file at which the current line starts */
  get offset(): number {
    return this.base + this.start;
  }

  /** no byte is left, neither here nor in the file */
  get finished(): boolean {
    return this.ended && this.start === this.end;
  }

  /** the current line has a terminator; after `complete` */
  get terminated(): boolean {
    return this.next > this.textEnd;
  }

  /** the current line is longer than any line that is read */
  get tooLong(): boolean {
    return this.next === 0 && this.end - this.start > MAX_LINE_BYTES;
  }

  /** Takes the next chunk. @returns false when the file has ended */
  async more(): Promise<boolean> {
    if (this.ended) return false;
    const { done, value } = await this.source.next();
    if (!done) {
      this.take(value);
      return true;
    }
    this.room(0);
    this.buf[this.end] = LF;
    this.buf[this.end + 1] = 0;
    this.ended = true;
    return false;
  }

  /** Finds the end of the current line. @returns false when more bytes are needed for that */
  complete(): boolean {
    const { buf, end } = this;
    let p = this.pos;
    while (p < end && buf[p] !== LF && buf[p] !== CR) p++;
    this.next = 0;
    // A carriage return at the very end may be half of a pair.
    if (p + 1 >= end && !this.ended && (p >= end || buf[p] === CR)) {
      this.pos = p;
      return false;
    }
    this.textEnd = p;
    if (p >= end) this.next = p;
    else this.next = buf[p] === CR && p + 1 < end && buf[p + 1] === LF ? p + 2 : p + 1;
    return true;
  }

  /** Goes on to the next line. */
  advance(): void {
    this.start = this.next;
    this.pos = this.next;
  }

  /** Reads what is left without looking at it. */
  async drain(): Promise<void> {
    this.start = this.end;
    this.pos = this.end;
    while (!this.ended) {
      const { done } = await this.source.next();
      if (done) this.ended = true;
    }
  }

  private take(chunk: Uint8Array): void {
    this.room(chunk.length);
    this.buf.set(chunk, this.end);
    this.end += chunk.length;
  }

  /** Makes room for more bytes and the two that stand behind the end of the file. */
  private room(bytes: number): void {
    if (this.end + bytes + 2 <= this.buf.length) return;
    const { start } = this;
    const held = this.end - start;
    const needed = held + bytes + 2;
    const fits = needed <= this.buf.length && held <= this.buf.length / 2;
    const target = fits ? this.buf : new Uint8Array(2 * needed);
    if (target === this.buf) target.copyWithin(0, start, this.end);
    else target.set(this.buf.subarray(start, this.end));
    this.buf = target;
    this.base += start;
    this.pos -= start;
    this.start = 0;
    this.end = held;
  }
}
