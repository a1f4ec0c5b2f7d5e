import { createHash } from "node:crypto";
import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import type { FileFacts, Reading } from "#shared/layers/reading.ts";
import { Refusal } from "#shared/refusal.ts";
import type { Edit } from "#shared/rewrite/edits.ts";
import { prepareTuning, type Tuning, type TuningInput } from "#shared/rewrite/prepare-tuning.ts";
import { Rewriter } from "#shared/rewrite/rewriter.ts";

export const sha256 = (data: Uint8Array | string): string => createHash("sha256").update(data).digest("hex");

/** Text as bytes, one a character, and back. */
export const bytesOf = (text: string): Buffer => Buffer.from(text, "latin1");
export const textOf = (bytes: Buffer): string => bytes.toString("latin1");

/** Sizes of the pieces a file comes in, again and again; none: in one piece. */
export type Cut = readonly number[];

function inPieces(bytes: Uint8Array, cut: Cut, take: (piece: Uint8Array) => void): void {
  for (let at = 0, k = 0; at < bytes.length; k++) {
    const size = cut.length === 0 ? bytes.length : cut[k % cut.length];
    take(bytes.subarray(at, at + size));
    at += size;
  }
}

export function read(text: string, machine: Machine, cut: Cut = []): Reading {
  const bytes = bytesOf(text);
  const reader = new ToolpathReader(machine);
  inPieces(bytes, cut, (piece) => reader.push(piece));
  return reader.end(sha256(bytes));
}

/** A file with its edits. */
export function apply(text: string, edits: readonly Edit[], file: Pick<FileFacts, "numbered">, cut: Cut = []): string {
  const pieces: Buffer[] = [];
  const rewriter = new Rewriter(edits, file, (bytes) => pieces.push(Buffer.from(bytes)));
  inPieces(bytesOf(text), cut, (piece) => rewriter.push(piece));
  rewriter.end();
  return textOf(Buffer.concat(pieces));
}

type Given = Partial<TuningInput> & { cut?: Cut };

export interface Tuned extends Tuning {
  text: string;
  reading: Reading;
}

/** Reads and tunes a file as a whole. */
export function tuneWhole(text: string, machine: Machine, profile: Profile, { cut = [], ...given }: Given = {}): Tuned {
  const reading = read(text, machine, cut);
  const input = { reading, machine, profile, digest: sha256, engine: "0.0.0-test", status: "trial-only" as const };
  const tuning = prepareTuning({ ...input, ...given });
  return { ...tuning, reading, text: apply(text, tuning.edits, reading.file, cut) };
}

/** The tuned text alone. */
export const tune = (text: string, machine: Machine, profile: Profile, given: Given = {}): string =>
  tuneWhole(text, machine, profile, given).text;

/** What a tuning is refused with. */
export function refusalOf(attempt: () => unknown): Refusal {
  try {
    attempt();
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

/** A text cut behind every line end. */
export const linesOf = (text: string): string[] => text.match(/[^\r\n]*(?:\r\n|\r|\n)|[^\r\n]+$/g) ?? [];

/** Lines without their terminators. */
export const rowsOf = (text: string): string[] => linesOf(text).map((line) => line.replace(/[\r\n]+$/, ""));

export const isOwnCommand = (line: string): boolean =>
  /^(N\d+ )?(M106|M42|SET_FAN_SPEED|SET_PIN) [^;]* ;ql[+=]?[\r\n]*$/.test(line);
export const isProvenance = (line: string): boolean => line.startsWith(";quenchline {");
export const isOwn = (line: string): boolean => isOwnCommand(line) || isProvenance(line);

/** A line's command: without number, checksum, comment and terminator. */
export const commandOf = (line: string): string =>
  line
    .replace(/\s*;.*$/s, "")
    .replace(/^N\d+ /, "")
    .replace(/\*\d+\s*$/, "")
    .trim();

/** A numbered line as it would stand without number and checksum; any other as it stands. */
export const unnumbered = (line: string): string =>
  line.replace(/^N\d+ /, "").replace(/\*\d+(?=\s*(;[^*]*)?[\r\n]*$)/, "");

/** Our commands of a tuned file, in order, each as it stands without its tag. */
export const ownCommands = (text: string): string[] => linesOf(text).filter(isOwnCommand).map(commandOf);

/** The provenance line's JSON. */
export const provenanceOf = (text: string) =>
  JSON.parse(linesOf(text).find(isProvenance)!.slice(";quenchline ".length));

/**
 * Around which line each of our commands stands: `after | command | before`, neighbours being the nearest lines that are
 * not ours.
 */
export function placesOf(text: string, command: RegExp = /./): { after: string; command: string; before: string }[] {
  const rows = rowsOf(text);
  return rows.flatMap((row, k) => {
    if (!isOwnCommand(row) || !command.test(commandOf(row))) return [];
    const after =
      rows
        .slice(0, k)
        .reverse()
        .find((other) => !isOwn(other)) ?? "";
    const before = rows.slice(k + 1).find((other) => !isOwn(other)) ?? "";
    return [{ after, command: commandOf(row), before }];
  });
}
