import type { Machine } from "#shared/formats/machine.ts";

/** Commands that stop the print on one machine or another, listed or not. */
export const KNOWN_PAUSES = ["M0", "M1", "M25", "M125", "M226", "M600", "M601", "PAUSE", "@PAUSE"];

/** The pauses of a machine by their command in capitals: blocking or not, or not listed in the machine document. */
export type PauseForms = ReadonlyMap<string, "blocking" | "passing" | "unlisted">;

export function pauseForms({ pauses }: Machine): PauseForms {
  const forms = new Map<string, "blocking" | "passing" | "unlisted">();
  for (const command of KNOWN_PAUSES) forms.set(command, "unlisted");
  for (const { command, blocking } of pauses) forms.set(plainCode(command), blocking ? "blocking" : "passing");
  return forms;
}

/** `m0600` and `M600` are one command. */
const plainCode = (command: string): string => command.toUpperCase().replace(/^M0+(?=\d)/, "M");
