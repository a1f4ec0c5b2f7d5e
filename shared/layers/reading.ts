import type { OwnTag } from "#shared/gcode/own-lines.ts";
import type { Place } from "#shared/refusal.ts";

/**
 * What reading a toolpath once yields. Everything later (plan, rewrite, proof, diff) works from this and never
 * parses the file again. Sizes grow with layers and control lines, not with bytes.
 */
export interface Reading {
  file: FileFacts;
  totals: Totals;
  layers: Layer[];
  /** print time before the first layer begins and after the last extruding move, s */
  beforeFirstLayerS: number;
  afterLastLayerS: number;
  /** from the first layer's write position to the line after the last extruding move */
  window: { start: Boundary; end: Boundary };
  /** line boundaries inside the window at which a command may be placed, ascending in time, line and byte */
  travels: Travels;
  /** every line that commands, or may command, an output, in file order */
  controls: ControlLine[];
  /** pauses anywhere in the file, in file order */
  pauses: PauseLine[];
  /** how the file addresses its outputs, for the check that a command lands where it should */
  outputs: OutputUse;
  findings: Finding[];
  /** set when the file was tuned by us before */
  provenance?: ProvenanceLine;
}

/** Our provenance line as it stands in the file; `data` is its JSON, undefined when it can't be parsed. */
export interface ProvenanceLine {
  line: number;
  offset: number;
  length: number;
  text: string;
  data: unknown;
}

export interface FileFacts {
  bytes: number;
  lines: number;
  /** hex digest of all bytes; filled in by whoever streamed them */
  sha256: string;
  newline: "lf" | "crlf" | "cr" | "mixed" | "none";
  /** N numbers with checksums on the command lines */
  numbered: boolean;
  /** the last line ends with a line terminator */
  finalNewline: boolean;
}

export interface Totals {
  printTimeS: number;
  layers: number;
  depositedLengthMm: number;
  travelLengthMm: number;
  filamentMm: number;
}

/** A line boundary: just before line `line`, which starts at byte `offset`; `timeS` is print time from the file's start. */
export interface Boundary {
  offset: number;
  line: number;
  timeS: number;
}

/** Structure of arrays: boundaries before travel moves, thinned with distance from the layer's end. */
export interface Travels {
  count: number;
  offset: Float64Array;
  line: Float64Array;
  timeS: Float64Array;
}

export interface Layer {
  index: number;
  object: number;
  /** highest extruding Z of the layer, mm */
  zMm: number;
  heightMm: number;
  /** line of the first extruding move, and the last line before the next layer's first extruding move */
  firstLine: number;
  lastLine: number;
  /** byte range of those lines, [firstByte, endByte) */
  firstByte: number;
  endByte: number;
  /** print time from the file's start at which the layer begins, s */
  startsAtS: number;
  timeS: number;
  extrudingTimeS: number;
  depositedLengthMm: number;
  travelLengthMm: number;
  filamentMm: number;
  volumeMm3: number;
  areaMm2: number;
  outlineMm: number;
  outlineFrom: "comments" | "geometry";
  boxMm: { min: [number, number]; max: [number, number] };
  nozzleC: number | null;
  bedC: number | null;
  /** duties commanded while the layer lasted, by channel id; time-weighted mean; commands counts fan or heater lines inside the layer */
  duty: Record<string, DutySeen>;
  waits: Wait[];
  /** where the layer's own commands are written: before its marker where one stands after the layer below, else before its first extruding move */
  writeAt: Boundary;
  /** name of the layer's marker comment as it stands in the file, if any */
  marker?: string;
}

export interface DutySeen {
  mean: number;
  min: number;
  max: number;
  commands: number;
}

export interface Wait {
  kind: "temperature" | "home" | "tool" | "pause" | "dwell";
  line: number;
  seconds: number | null;
}

/** A line that sets, or may set, an output that one of the machine's channels owns. */
export interface ControlLine {
  /** index into machine.channels */
  channel: number;
  line: number;
  offset: number;
  /** length in bytes, terminator included */
  length: number;
  timeS: number;
  /** 0 before the first layer, layer index inside the window, Infinity after the last layer */
  layer: number;
  /**
   * `duty`: sets the duty and nothing else.
   * `configuration`: carries parameters instead of a duty (never removed).
   * `mixed`: sets a duty and something else, or hides it behind a parameter: cannot be removed safely.
   */
  does: "duty" | "configuration" | "mixed";
  /** 0-1; NaN where `does` is configuration or the duty is hidden */
  duty: number;
  /** the command as written, without number, checksum and comment */
  code: string;
  /** a line of ours from an earlier tuning: of the plan, a kept raise cut to a limit, or what ended a kept raise */
  ours: OwnTag | false;
}

/** First lines of each kind, where there is one; our own lines don't count. */
export interface OutputUse {
  /** a named command of a firmware family that ignores the P of M106 */
  namedCommand?: { name: string; line: number };
  /** M106 or M107 with a P above 0 */
  indexedFanLine?: number;
  /** M106 or M107 without P */
  bareFanLine?: number;
  /** a line with our tag that drives no channel of this machine: tuned for another one */
  strayOwnLine?: number;
  /** the first line with a command for an output that firmware families read in different ways */
  unclear?: { code: string; line: number };
  /** outputs that the file sets between first and last layer and the machine has no channel for, by their command */
  foreign?: { command: string; count: number; line: number }[];
}

export interface PauseLine {
  /** the command as written, e.g. `M600` */
  command: string;
  line: number;
  offset: number;
  length: number;
  timeS: number;
  layer: number;
}

export interface Finding extends Place {
  code: string;
  severity: "info" | "warning";
  message: string;
}
