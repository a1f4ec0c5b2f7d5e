import { LineKind, LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import { latin } from "#tests/helpers/reading.ts";

const LETTERS = [..."ABCDEFGHIJKLMNOPQRSTUVWXYZ"];
const KINDS = Object.keys(LineKind) as (keyof typeof LineKind)[];

/** One scan as plain data. */
export interface Scanned {
  kind: keyof typeof LineKind;
  /** values by letter; of a letter that stands twice the last one, of G all are in `g` */
  words: Record<string, number>;
  /** letters without a number, and letters that stand more than once */
  bare: string;
  repeated: string;
  commands: number;
  checksum: number;
  comment: string | undefined;
  /** the line without its terminator, and its length with it */
  text: string;
  bytes: number;
}

/** Scans one line; a line feed is added where it has no terminator. */
export function scanText(text: string, scan = new LineScan()): Scanned {
  const line = /[\r\n]$/.test(text) ? text : `${text}\n`;
  const buf = latin(`${line}\0`);
  const next = scanLine(buf, 0, scan);
  const slice = (from: number, to: number): string => String.fromCharCode(...buf.subarray(from, to));
  const lettersOf = (mask: number): string[] => LETTERS.filter((_, k) => (mask & (1 << k)) !== 0);
  return {
    kind: KINDS.find((kind) => LineKind[kind] === scan.kind)!,
    words: Object.fromEntries(
      lettersOf(scan.mask & ~scan.bare).map((letter) => [letter, scan.value[letter.charCodeAt(0) - 65]]),
    ),
    bare: lettersOf(scan.bare).join(""),
    repeated: lettersOf(scan.repeated).join(""),
    commands: scan.commands,
    checksum: scan.starAt < 0 ? -1 : scan.checksum,
    comment: scan.commentStart < 0 ? undefined : slice(scan.commentStart, scan.commentEnd),
    text: slice(0, scan.textEnd),
    bytes: next,
  };
}

/** The line's words or name or message, without comment and checksum. */
export function codeOf(text: string): string {
  const scan = new LineScan();
  const buf = latin(`${text}\n\0`);
  scanLine(buf, 0, scan);
  return String.fromCharCode(...buf.subarray(scan.codeStart, scan.codeEnd));
}

/** The G words in their order. */
export function gWordsOf(text: string): number[] {
  const scan = new LineScan();
  scanLine(latin(`${text}\n\0`), 0, scan);
  return [...scan.gWords.subarray(0, scan.gCount)];
}
