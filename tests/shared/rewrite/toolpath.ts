import { hostChecksum } from "#shared/gcode/host-checksum.ts";

/** How the lines of a toolpath become bytes. */
export interface Ending {
  /** one terminator, or several in turn */
  newline?: string | string[];
  finalNewline?: boolean;
  /** number of the first line where lines are numbered */
  numberedFrom?: number;
}

/** Lines as text, one character a byte. */
export function written(lines: readonly string[], ending: Ending = {}): string {
  const { newline = "\n", finalNewline = true, numberedFrom } = ending;
  const ends = typeof newline === "string" ? [newline] : newline;
  const numbered = numberedFrom === undefined ? lines : withNumbers(lines, numberedFrom);
  return numbered.map((line, k) => line + (k < lines.length - 1 || finalNewline ? ends[k % ends.length] : "")).join("");
}

/** Numbers and checksums on all lines but comments and empty ones. */
export function withNumbers(lines: readonly string[], first: number): string[] {
  let number = first;
  return lines.map((line) => (/^\s*(;|\(|$)/.test(line) ? line : withChecksum(`N${number++} ${line}`)));
}

/** A checksum stands behind the command and before a comment; a message is text to the line's end. */
export function withChecksum(line: string): string {
  if (/\bM117\b/.test(line)) return `${line}*${hostChecksum(line)}`;
  const [, command, comment] = /^([^;]*?)(\s*;.*)?$/s.exec(line)!;
  return `${command}*${hostChecksum(command)}${comment ?? ""}`;
}

/** What stands in a layer besides its two sides: whole lines, by place. */
export interface LayerLines {
  /** before the layer's marker, behind the layer below */
  before?: string[];
  /** between the marker and the first laying move */
  begin?: string[];
  /** behind the first side, without a travel in between */
  middle?: string[];
  /** behind the last laying move */
  end?: string[];
  /** Z of the layer's top where it is not one layer higher, mm */
  zMm?: number;
  /** repeated sides, each with a travel before it: about 2.2 s a pair at 20 mm/s */
  rounds?: number;
}

export interface PartOptions {
  layers: LayerLines[];
  marker?: (layer: number, zMm: number) => string | undefined;
  start?: string[];
  finish?: string[];
}

/**
 * The lines of a small part, layers 0.2 mm high: in each, a travel, one side laid, what `middle` holds, and another side
 * laid. Material is relative. At 20 mm/s a side of 20 mm takes a second, so that times are easy to reckon.
 */
export function partLines({ layers, marker = defaultMarker, start = START, finish = FINISH }: PartOptions): string[] {
  const lines = [...start];
  let top = 0;
  for (const [k, { before = [], begin = [], middle = [], end = [], zMm, rounds = 1 }] of layers.entries()) {
    top = zMm ?? Math.round((top + 0.2) * 1000) / 1000;
    lines.push(...before);
    const comment = marker(k, top);
    if (comment !== undefined) lines.push(comment);
    lines.push(...begin, `G0 X10 Y10 Z${top} F6000`, "G1 X30 Y10 E1 F1200", ...middle, "G1 X30 Y30 E1");
    for (let round = 1; round < rounds; round++) lines.push("G0 X10 Y10 F6000", "G1 X30 Y10 E1 F1200", "G1 X30 Y30 E1");
    lines.push(...end);
  }
  return [...lines, ...finish];
}

export const START = ["; a small part", "G21", "G90", "M83", "M104 S250", "G28", "M109 S400", "G92 E0"];
export const FINISH = ["G0 Z40", "M104 S0", "; that is all"];
const defaultMarker = (layer: number): string => `;LAYER:${layer}`;

/** So many layers without anything in them. */
export const plain = (count: number, each: LayerLines = {}): LayerLines[] => Array.from({ length: count }, () => each);
