import type { Machine } from "#shared/formats/machine.ts";
import { type ReadOptions, ToolpathReader } from "#shared/layers/read-toolpath.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { Refusal } from "#shared/refusal.ts";
import { tern } from "#tests/helpers/tern.ts";

const TERN = tern();

/** Text as bytes, one a character. */
export const latin = (text: string): Uint8Array => Uint8Array.from(text, (character) => character.charCodeAt(0));

/** The bytes in pieces that end at the given places, ascending. */
export function cutAt(bytes: Uint8Array, cuts: readonly number[]): Uint8Array[] {
  const borders = [0, ...cuts.filter((cut) => cut <= bytes.length), bytes.length];
  return borders.slice(1).map((to, k) => bytes.subarray(borders[k], to));
}

/** The bytes in pieces of one size. */
export const cutEvery = (bytes: Uint8Array, size: number): Uint8Array[] =>
  cutAt(
    bytes,
    Array.from({ length: Math.floor(bytes.length / size) }, (_, k) => (k + 1) * size),
  );

export function readChunks(chunks: Iterable<Uint8Array>, machine: Machine = TERN, options: ReadOptions = {}): Reading {
  const reader = new ToolpathReader(machine, options);
  for (const chunk of chunks) reader.push(chunk);
  return reader.end("");
}

export const readBytes = (bytes: Uint8Array, machine?: Machine, options?: ReadOptions): Reading =>
  readChunks([bytes], machine, options);

/** Lines are joined by line feeds; a text is taken as it is. */
export const readText = (text: string | readonly string[], machine?: Machine, options?: ReadOptions): Reading =>
  readBytes(latin(typeof text === "string" ? text : `${text.join("\n")}\n`), machine, options);

/** What reading refuses, as plain data; anything else that is thrown comes through. */
export function refusalOf(read: () => unknown): Pick<Refusal, "code" | "message" | "remedy" | "place"> {
  try {
    read();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const { code, message, remedy, place } = error;
    return { code, message, remedy, place };
  }
  throw new Error("this was read without a refusal");
}

/** A reading, or the refusal instead: either way the same for the same bytes. */
export function outcomeOf(read: () => Reading): Reading | ReturnType<typeof refusalOf> {
  let reading: Reading | undefined;
  try {
    reading = read();
  } catch (error) {
    return refusalOf(() => {
      throw error;
    });
  }
  return reading;
}

/** Codes of the findings, each with its line where it has one. */
export const findingsOf = ({ findings }: Reading): string[] =>
  findings.map(({ code, line }) => (line === undefined ? code : `${code} ${line}`));
