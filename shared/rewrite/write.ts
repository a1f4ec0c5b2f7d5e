import type { OwnTag } from "#shared/gcode/own-lines.ts";
import type { Boundary } from "#shared/layers/reading.ts";

/** One command of ours: a duty written at a line boundary. */
export interface Write extends Boundary {
  duty: number;
  tag: OwnTag;
}

/** A duty that is wanted from a boundary on. */
export interface Target {
  /** position in the list of boundaries */
  at: number;
  duty: number;
}
