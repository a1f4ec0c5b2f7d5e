import { z } from "zod";
import { fields, Label, Sha256, Version, wholeWithin } from "#shared/formats/fields.ts";
import { PROVENANCE_PREFIX } from "#shared/gcode/own-lines.ts";

const Named = fields({ name: Label, sha256: Sha256, version: Version.optional() });

/** What a tuned file says of itself, in its provenance line. */
export const ProvenanceFacts = fields({
  v: z.literal(1),
  profile: Named,
  machine: Named,
  polymer: Named.optional(),
  /** of the untuned file, kept when the file is tuned again */
  original: Sha256,
  engine: z.string(),
  status: z.enum(["trial-only", "approved"]),
  channels: z.array(z.string()),
  withinLayer: z.enum(["replace", "keep-raises"]),
  /** number of our command lines */
  lines: wholeWithin(0, Number.MAX_SAFE_INTEGER),
  seal: Sha256,
});
export type ProvenanceFacts = z.infer<typeof ProvenanceFacts>;

/**
 * Reads a provenance line. It must be written in the one way in which such a line is written: JSON without blanks, its
 * fields in order, printable ASCII.
 *
 * @param text the whole line, bytes as Latin-1
 * @returns the facts, or what is wrong with the line
 */
export function readProvenance(text: string): ProvenanceFacts | string {
  if (!text.startsWith(PROVENANCE_PREFIX)) return "has something before it in its line";
  const json = text.slice(PROVENANCE_PREFIX.length);
  let data: unknown;
  try {
    data = JSON.parse(json);
  } catch {
    return "is not JSON";
  }
  const result = ProvenanceFacts.safeParse(data);
  if (!result.success) {
    const { path, message } = result.error.issues[0];
    return `is damaged at ${path.join(".") || "its fields"}: ${message}`;
  }
  return provenanceText(result.data) === json ? result.data : "is not written as such a line is written";
}

/** The one way in which these facts are written: their fields in order, no blanks, printable ASCII. */
export const provenanceText = (facts: ProvenanceFacts): string => asciiJson(inOrder(facts));

function inOrder({ profile, machine, polymer, ...rest }: ProvenanceFacts): object {
  const { v, original, engine, status, channels, withinLayer, lines, seal } = rest;
  return {
    v,
    profile,
    machine,
    ...(polymer ? { polymer } : {}),
    original,
    engine,
    status,
    channels,
    withinLayer,
    lines,
    seal,
  };
}

function asciiJson(value: object): string {
  const escaped = (character: string) => `\\u${character.charCodeAt(0).toString(16).padStart(4, "0")}`;
  return JSON.stringify(value).replace(/[^ -~]/g, escaped);
}
