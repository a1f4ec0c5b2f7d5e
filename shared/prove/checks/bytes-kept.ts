import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Difference } from "#shared/prove/comparison.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { counted } from "#shared/prove/wording.ts";

/** The size and digest of a file. */
export interface FileDigest {
  sha256: string;
  bytes: number;
}

/** Every line of the original that was not taken out stands in the tuned file, in order, byte for byte. */
export function checkBytesKept(evidence: Evidence, input: FileDigest): Check {
  const { kept, renumbered } = evidence.comparison;
  const numbers = renumbered > 0 ? `, and ${counted(renumbered, "line")} but for number and checksum` : "";
  const found = `${counted(kept, "line")} of the original stand in the tuned file byte for byte${numbers}, in their order.`;
  return verdict("bytes-kept", problemOf(evidence, input), found);
}

function problemOf(evidence: Evidence, { sha256, bytes }: FileDigest): string | undefined {
  const { difference, kept, renumbered, removed } = evidence.comparison;
  const { file } = evidence.reading;
  if (difference) return `The files part ${differencePlace(evidence, difference)}: ${difference.message}.`;
  if (sha256 !== file.sha256 || bytes !== file.bytes)
    return `The original of ${counted(bytes, "byte")} is not the file of ${counted(file.bytes, "byte")} that was read.`;
  const lines = kept + renumbered + removed;
  if (lines !== file.lines) return `The original has ${counted(lines, "line")}, but ${file.lines} were read.`;
  return undefined;
}

/** `at line 12 of the tuned file, line 10 of the original (layer 3)` */
export function differencePlace(evidence: Evidence, { tunedLine, originalLine, offset }: Difference): string {
  const lines = [
    tunedLine === undefined ? "" : `line ${tunedLine} of the tuned file`,
    originalLine === undefined ? "" : `line ${originalLine} of the original`,
  ].filter((text) => text !== "");
  return `at ${lines.join(", ") || "the end"} (${evidence.layerText(offset)})`;
}
