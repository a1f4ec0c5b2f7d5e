import type { Machine } from "#shared/formats/machine.ts";
import { KNOWN_PAUSES } from "#shared/prove/pause-line.ts";

/** Bytes at which the fast comparison stops and the line is looked at as a whole; 1 where it stops. */
export interface Watch {
  /** anywhere in a line */
  within: Uint8Array;
  /** as the first byte of a line, behind a line number */
  first: Uint8Array;
}

/**
 * What to watch for, so that no command of an output, no pause and no line of ours is run over: they hold an M, begin
 * with the name of a command that is known, or carry our tag or our prefix, both of which hold a q.
 */
export function watchFor(machine: Machine, numbered: boolean): Watch {
  const names = [...KNOWN_PAUSES, ...machine.pauses.map(({ command }) => command), "SET_PIN", "SET_FAN_SPEED"];
  const initials = names.map((name) => name[0].toUpperCase() + name[0].toLowerCase()).join("");
  return { within: table("\n\rMmq"), first: table(` \t(${initials}${numbered ? "" : "Nn"}`) };
}

/** In a numbered line a comment before the checksum, or a checksum, ends what is plain. */
export function numberedLineWatch({ within }: Watch): Uint8Array {
  const all = table("*;(");
  for (let k = 0; k < 256; k++) all[k] |= within[k];
  return all;
}

function table(characters: string): Uint8Array {
  const bytes = new Uint8Array(256);
  for (let k = 0; k < characters.length; k++) bytes[characters.charCodeAt(k)] = 1;
  return bytes;
}
