import type { Comparison, OutputEntry } from "#shared/prove/comparison.ts";
import { type ProvenanceFacts, provenanceText } from "#shared/prove/provenance.ts";

/**
 * The text whose digest is the seal: what the provenance line says but for the seal itself, and one line for every command of ours and every command of the file that was kept on a
 * driven channel, in the order of the tuned file, each with the number of the file's own lines before it. A change to
 * one of them, or to its place, changes the digest.
 *
 * @param isKept whether an output command of the file is such a kept one
 */
export function sealText(
  facts: ProvenanceFacts,
  { entries }: Comparison,
  isKept: (entry: OutputEntry) => boolean,
): string {
  const lines = [`${provenanceText({ ...facts, seal: "" })}\n`];
  for (const entry of entries) {
    if (entry.what === "own") lines.push(`${entry.keptBefore} ${entry.tag} ${entry.code}\n`);
    else if (entry.what === "file" && isKept(entry)) lines.push(`${entry.keptBefore} kept ${entry.code}\n`);
  }
  return lines.join("");
}
