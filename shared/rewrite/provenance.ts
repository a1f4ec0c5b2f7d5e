import type { Channel } from "#shared/formats/machine.ts";
import { PROVENANCE_PREFIX } from "#shared/gcode/own-lines.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { Refusal } from "#shared/refusal.ts";

/** Hex SHA-256 of a text; given by the caller, since the core knows no platform. */
export type Digest = (text: string) => string;

/** What a tuned file says of itself. */
export interface Provenance {
  v: 1;
  profile: Named;
  machine: Named;
  /** card that duties were solved with, where the profile has a rule that holds */
  polymer?: Named;
  /** SHA-256 of the untuned file, kept when the file is tuned again */
  original: string;
  engine: string;
  status: "trial-only" | "approved";
  channels: string[];
  withinLayer: "replace" | "keep-raises";
  /** number of our command lines */
  lines: number;
  /** digest of this line with an empty seal, of our commands and of the kept raises with their places */
  seal: string;
}

export interface Named {
  name: string;
  /** of what the document says: its text without the version */
  sha256: string;
  /** number that the document has for its version, if it has one */
  version?: number;
}

/** The one comment line, printable ASCII whatever the names hold, so that no text of a user can end the line. */
export const provenanceLine = (provenance: Provenance): string => PROVENANCE_PREFIX + provenanceText(provenance);

/** The facts as the line writes them: also what the seal is made over, with an empty `seal`. */
export const provenanceText = (provenance: Provenance): string =>
  JSON.stringify(provenance).replace(/[^\x20-\x7e]/g, (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, "0")}`);

/** What the next tuning is made with. */
type Next = Pick<Provenance, "profile" | "machine" | "withinLayer">;

/**
 * The SHA-256 of the untuned file: of this one, or of the one that an earlier tuning was made from.
 *
 * @param driven channels that the profile drives
 * @throws Refusal when the earlier tuning can't be taken back
 */
export function untunedDigest(reading: Reading, driven: readonly Channel[], next: Next): string {
  const { provenance, controls, outputs, findings } = reading;
  const ownLine = controls.find((line) => line.ours);
  const refuse = (code: string, message: string, line: number | undefined): never => {
    throw new Refusal(code, message, "Tune the original file instead of this one.", { line });
  };
  if (outputs.strayOwnLine !== undefined)
    refuse("tuned-for-other-machine", "this file was tuned for a machine with other outputs", outputs.strayOwnLine);
  if (findings.some(({ code }) => code === "provenance-twice"))
    refuse("provenance-twice", "this file holds two provenance lines", provenance?.line);
  if (!provenance) {
    if (ownLine)
      refuse("provenance-missing", "this file holds lines of an earlier tuning but no provenance line", ownLine.line);
    return reading.file.sha256;
  }
  const earlier = (provenance.data ?? {}) as Partial<Provenance>;
  const { original, channels } = earlier;
  if (typeof original !== "string" || !/^[0-9a-f]{64}$/.test(original) || !Array.isArray(channels))
    return refuse("provenance-broken", "the provenance line of this file is damaged", provenance.line);
  const lost = channels.filter((id) => !driven.some((channel) => channel.id === id));
  if (lost.length > 0)
    refuse(
      "tuned-for-other-channels",
      `the earlier tuning of this file replaced the commands of ${lost.join(", ")}, which this profile does not drive`,
      provenance.line,
    );
  const fan = driven.find(({ id, kind }) => kind === "fan" && channels.includes(id));
  if (fan && next.withinLayer === "keep-raises" && !sameDocuments(earlier, next))
    refuse(
      "raises-lost",
      `this profile keeps the raises of ${fan.id}, and the earlier tuning of this file, with another profile or machine, has taken some of them out`,
      provenance.line,
    );
  return original;
}

const sameDocuments = (earlier: Partial<Provenance>, next: Next): boolean =>
  earlier.profile?.sha256 === next.profile.sha256 && earlier.machine?.sha256 === next.machine.sha256;
