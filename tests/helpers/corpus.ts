import { existsSync, readFileSync } from "node:fs";

/** Real toolpaths and reference timings, beside the project; tests that use them are skipped where they are absent. */
const FOLDER = new URL("../../../shared/corpus/", import.meta.url);

export const corpusIsHere = existsSync(new URL("timing/c01.json", FOLDER));

export const CORPUS_FILES = [
  "c01",
  "c02",
  "c04",
  "c13",
  "d00-base-abs-e",
  "d01-firmware-retract-rel-e",
  "d02-numbered-checksum",
  "d03-sequential-two-objects",
  "d04-fan-heater-mix",
  "d05-glued-lowercase-crlf",
  "d06-g91-relative",
  "d07-inches",
] as const;
export type CorpusFile = (typeof CORPUS_FILES)[number];

/** Seconds per layer as independent planners have them, one column a planner. */
export interface Timing {
  lines: number;
  beforeFirstLayerS: number;
  totalsS: Record<string, number>;
  layers: { index: number; zMm: number; firstLine: number; timeS: Record<string, number> }[];
}

/** A tiny program with the exact speeds and times of its moves, at two minimum cruise ratios. */
export interface MicroProgram {
  name: string;
  gcode: string;
  dwell_s: number;
  "mcr0.5": MicroResult;
  mcr0: MicroResult;
}

export interface MicroResult {
  total_s: number;
  moves: { d: number; start_v: number; cruise_v: number; end_v: number; t: number }[];
}

export const corpusToolpath = (name: CorpusFile): Uint8Array =>
  readFileSync(new URL(`toolpaths/${name}.gcode`, FOLDER));

export const corpusTiming = (name: CorpusFile): Timing => readJson(`timing/${name}.json`) as Timing;

export const microPrograms = (): MicroProgram[] => readJson("timing/micro.json") as MicroProgram[];

const readJson = (path: string): unknown => JSON.parse(readFileSync(new URL(path, FOLDER), "utf8"));
