import type { Machine } from "#shared/formats/machine.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import { DIALECTS, type Dialect, generateToolpath } from "#tests/bench/generate-toolpath.ts";
import { median, milliseconds, shuffledRounds } from "#tests/bench/statistics.ts";

const CHUNK_BYTES = 1 << 19;

/** The yardstick: touches every byte once and counts line feeds. */
export function countLines(bytes: Uint8Array): number {
  let lines = 0;
  for (let i = 0; i < bytes.length; i++) if (bytes[i] === 10) lines++;
  return lines;
}

export interface ChunkTimes {
  analysisMs: number;
  loopMs: number;
  lines: number;
}

/** Analysis and byte loop over the same file, chunk by chunk in turn. */
export function analyseInterleaved(bytes: Uint8Array, machine: Machine): ChunkTimes {
  const reader = new ToolpathReader(machine);
  const times: ChunkTimes = { analysisMs: 0, loopMs: 0, lines: 0 };
  for (let at = 0; at < bytes.length; at += CHUNK_BYTES) {
    const chunk = bytes.subarray(at, at + CHUNK_BYTES);
    times.analysisMs += milliseconds(() => reader.push(chunk));
    times.loopMs += milliseconds(() => {
      times.lines += countLines(chunk);
    });
  }
  times.analysisMs += milliseconds(() => reader.end(""));
  return times;
}

/** Median of analysis ÷ byte loop, the first rounds left out as warm-up. */
export function analysisRatio(
  bytes: Uint8Array,
  machine: Machine,
  rounds: number,
): { ratio: number; nsPerLine: number; loopNsPerLine: number } {
  const runs = Array.from({ length: rounds + 2 }, () => analyseInterleaved(bytes, machine)).slice(2);
  return {
    ratio: median(runs.map(({ analysisMs, loopMs }) => analysisMs / loopMs)),
    nsPerLine: median(runs.map(({ analysisMs, lines }) => (analysisMs * 1e6) / lines)),
    loopNsPerLine: median(runs.map(({ loopMs, lines }) => (loopMs * 1e6) / lines)),
  };
}

/** Nanoseconds a line by dialect, the dialects in shuffled turns, each calibrated by the byte loop of its own run. */
export function dialectCosts(bytesEach: number, machine: Machine, rounds: number): Map<Dialect, number> {
  const files = new Map(DIALECTS.map((dialect) => [dialect, join(generateToolpath(bytesEach, dialect))]));
  const costs = new Map<Dialect, number[]>(DIALECTS.map((dialect) => [dialect, []]));
  for (const dialect of shuffledRounds(DIALECTS, rounds + 1)) {
    const { analysisMs, loopMs, lines } = analyseInterleaved(files.get(dialect)!, machine);
    const loopNsPerByte = (loopMs * 1e6) / files.get(dialect)!.length;
    costs.get(dialect)!.push((analysisMs * 1e6) / lines / loopNsPerByte);
  }
  return new Map([...costs].map(([dialect, values]) => [dialect, median(values.slice(1))]));
}

export function join(pieces: Iterable<Uint8Array>): Uint8Array {
  const list = [...pieces];
  const joined = new Uint8Array(list.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const piece of list) {
    joined.set(piece, at);
    at += piece.length;
  }
  return joined;
}
