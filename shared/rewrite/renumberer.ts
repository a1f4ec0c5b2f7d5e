import { hostChecksum } from "#shared/gcode/host-checksum.ts";
import { LineFeeder } from "#shared/gcode/line-feeder.ts";
import { bit, LineKind, LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import type { Blocks } from "#shared/rewrite/rewriter.ts";

const N = 13;
const M = 12;
const N_BIT = bit("N");
const M_BIT = bit("M");

/**
 * Writes a numbered file: from the first edit on, every numbered line gets the number after the one before it and a new
 * checksum; all else in the line stays. A line that sets the counter (M110) stands as it is and sets it.
 */
export class Renumberer {
  private readonly out: Blocks;
  private readonly feeder = new LineFeeder((buf, from, to, offset, open) => this.lines(buf, from, to, offset, open));
  private readonly scan = new LineScan();
  /** output byte from which lines are renumbered: bytes before the first edit are the same in both files */
  private readonly startsAt: number;
  private last = 0;

  constructor(out: Blocks, firstEdit: number) {
    this.out = out;
    this.startsAt = firstEdit;
  }

  write(bytes: Uint8Array): void {
    this.feeder.push(bytes);
  }

  /** Our own lines: commands get a placeholder number that is replaced like any other. */
  text(text: string): void {
    const numbered = text.replace(/(^|[\r\n])([^;\r\n]+?) (;ql[+=]?)(?=[\r\n]|$)/g, "$1N0 $2*0 $3");
    this.feeder.push(Uint8Array.from(numbered, (c) => c.charCodeAt(0)));
  }

  end(): void {
    this.feeder.end();
    this.out.end();
  }

  private lines(buf: Uint8Array, from: number, to: number, offset: number, open: boolean): void {
    const { scan } = this;
    let unchanged = from;
    let p = from;
    while (p < to) {
      const start = p;
      p = scanLine(buf, p, scan);
      const setsCounter = scan.kind === LineKind.words && (scan.mask & M_BIT) !== 0 && scan.value[M] === 110;
      if ((scan.mask & N_BIT) === 0 || (scan.starAt < 0 && !setsCounter)) continue;
      const given = scan.value[N];
      if (offset + start - from < this.startsAt || setsCounter || given === this.last + 1) {
        this.last = given;
        continue;
      }
      this.out.write(buf.subarray(unchanged, start));
      this.renumbered(buf, start);
      unchanged = scan.starAt + 1 + digitsFrom(buf, scan.starAt + 1);
    }
    // The terminator lent to an open last line is not written.
    this.out.write(buf.subarray(unchanged, open ? to - 1 : to));
  }

  private renumbered(buf: Uint8Array, start: number): void {
    const { scan } = this;
    let digits = start;
    while (buf[digits] !== 78 && buf[digits] !== 110) digits++;
    digits++;
    while (buf[digits] === 32 || buf[digits] === 9) digits++;
    const after = digits + digitsFrom(buf, digits);
    const number = ascii(String(++this.last));
    const checksum = hostChecksum(buf, start, digits) ^ hostChecksum(number) ^ hostChecksum(buf, after, scan.starAt);
    this.out.write(buf.subarray(start, digits));
    this.out.write(number);
    this.out.write(buf.subarray(after, scan.starAt));
    this.out.write(ascii(`*${checksum}`));
  }
}

const ascii = (text: string): Uint8Array => Uint8Array.from(text, (c) => c.charCodeAt(0));

function digitsFrom(buf: Uint8Array, start: number): number {
  let p = start;
  while (buf[p] >= 48 && buf[p] <= 57) p++;
  return p - start;
}
