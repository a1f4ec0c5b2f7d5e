import type { OwnTag } from "#shared/gcode/own-lines.ts";
import type { OutputSetting } from "#shared/prove/output-line.ts";

/** What comparing the two files has found. */
export interface Comparison {
  /** lines of the original: as they stand; but for number and checksum; not in the tuned file */
  kept: number;
  renumbered: number;
  removed: number;
  /** lines of the tuned file that are ours */
  inserted: number;
  /** the first place where the files part without a reason; nothing behind it was compared */
  difference?: Difference;
  /** lines of ours, outputs and pauses of the tuned file, in its order */
  entries: Entry[];
  removals: Removal[];
  /** bytes of the original at which runs of lines taken out begin, and at which the line behind each stands */
  gaps: { from: number[]; to: number[] };
  numbering: { followed: number; wrong?: { tunedLine: number; message: string } };
  /** the first line that the reading and this reader take for different things */
  disagreement?: Difference;
  /** output commands and pauses of the original that both took alike */
  agreed: number;
}

export interface Difference {
  message: string;
  tunedLine?: number;
  originalLine?: number;
  /** byte of the original */
  offset: number;
}

/** A line of the tuned file that the proof is about. */
export type Entry = ProvenanceEntry | OwnEntry | OutputEntry | PauseEntry;

/** Where a line stands. */
export interface Standing {
  tunedLine: number;
  /** lines of the file's own before it in the tuned file */
  keptBefore: number;
  /**
   * Bytes of the original between which it stands. A line of ours stands somewhere between the line before `from` and
   * the line at `to`: what lies between the two was taken out. A line of the file stands at `from`, which is `to`.
   */
  from: number;
  to: number;
}

export interface ProvenanceEntry extends Standing {
  what: "provenance";
  /** the whole line */
  text: string;
  /** it does not end as the lines of the file do */
  oddEnd: boolean;
}

export interface OwnEntry extends Standing {
  what: "own";
  tag: OwnTag;
  /** the command without number, checksum and tag */
  code: string;
  /** index into machine.channels and duty; undefined when the command is not one of ours for any channel */
  set?: { channel: number; duty: number };
  /** what is wrong with how the line is written */
  problem?: string;
}

export interface OutputEntry extends Standing {
  what: "file";
  code: string;
  set: OutputSetting;
}

export interface PauseEntry extends Standing {
  what: "pause";
  command: string;
  /** where the line behind it starts */
  endsAt: number;
}

/** Lines taken out of the original, of one kind. */
export interface Removal {
  /** index into machine.channels; -1 for a line that sets no channel */
  channel: number;
  does: OutputSetting["does"] | "nothing";
  /** of an earlier tuning */
  ours: boolean;
  inWindow: boolean;
  lines: number;
  firstLine: number;
}
