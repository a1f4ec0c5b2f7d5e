import { LineKind, LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import type { LineFeed } from "#shared/prove/line-feed.ts";

const N_BIT = 1 << 13;
const M_BIT = 1 << 12;
/** Longest command that is looked at; every command of an output is far shorter. */
const CODE_BYTES = 512;

/** One line taken apart, for the few that are looked at as a whole. The same object is filled again for every line. */
export class LineLook {
  readonly scan = new LineScan();
  buf = new Uint8Array(0);
  start = 0;
  textEnd = 0;
  next = 0;
  /** the digits of the line number; both -1 where there is none */
  numberStart = -1;
  numberEnd = -1;
  /** where the `*` of the checksum stands, and the byte after its digits; both -1 where there is none */
  starAt = -1;
  sumEnd = -1;

  take(feed: LineFeed): void {
    const { scan } = this;
    this.buf = feed.buf;
    this.start = feed.start;
    this.textEnd = feed.textEnd;
    this.next = feed.next;
    scanLine(feed.buf, feed.start, scan);
    this.numberStart = -1;
    this.numberEnd = -1;
    this.starAt = -1;
    this.sumEnd = -1;
    if ((scan.mask & N_BIT) === 0 || scan.kind === LineKind.blank) return;
    this.findNumber();
    if (this.numberStart < 0) return;
    this.starAt = scan.starAt;
    if (this.starAt >= 0) this.sumEnd = this.digitsFrom(this.starAt + 1);
  }

  /** the line's number counts: it stands before a command and comes with a checksum */
  get numbered(): boolean {
    return this.starAt >= 0;
  }

  get number(): number {
    return Number(this.text(this.numberStart, this.numberEnd));
  }

  get checksum(): number {
    return this.sumEnd > this.starAt + 1 ? Number(this.text(this.starAt + 1, this.sumEnd)) : -1;
  }

  /** the checksum that the bytes before the `*` give */
  get computedSum(): number {
    let sum = 0;
    for (let p = this.start; p < this.starAt; p++) sum ^= this.buf[p];
    return sum;
  }

  /** M110 sets the counter: the number that the next line follows, or -1 for any other line */
  get counterSet(): number {
    const { kind, mask, value } = this.scan;
    return kind === LineKind.words && (mask & M_BIT) !== 0 && value[12] === 110 ? value[13] : -1;
  }

  /** The command without number, checksum and comment. */
  get code(): string {
    const from = this.numberEnd >= 0 ? this.numberEnd : this.start;
    // The scanner keeps no end of the code for plain moves: it is the end of the line.
    const end = this.scan.plain ? this.textEnd : this.scan.codeEnd;
    const to = this.starAt >= 0 ? Math.min(this.starAt, end) : end;
    return this.text(from, Math.min(to, from + CODE_BYTES))
      .replace(/^(\s|\([^()]*\))+/, "")
      .trimEnd();
  }

  /** The whole line, cut off where it is too long to show. */
  get shown(): string {
    const text = this.text(this.start, Math.min(this.textEnd, this.start + 60));
    return this.textEnd - this.start > 60 ? `${text}…` : text;
  }

  get terminator(): string {
    return this.text(this.textEnd, this.next);
  }

  /** Bytes as Latin-1. */
  text(from: number, to: number): string {
    let text = "";
    for (let p = from; p < to; p++) text += String.fromCharCode(this.buf[p]);
    return text;
  }

  private findNumber(): void {
    let p = this.start;
    while (this.buf[p] === 32 || this.buf[p] === 9) p++;
    if (this.buf[p] !== 78 && this.buf[p] !== 110) return;
    p++;
    while (this.buf[p] === 32 || this.buf[p] === 9) p++;
    const end = this.digitsFrom(p);
    if (end === p) return;
    this.numberStart = p;
    this.numberEnd = end;
  }

  private digitsFrom(from: number): number {
    let p = from;
    while (this.buf[p] >= 48 && this.buf[p] <= 57) p++;
    return p;
  }
}
