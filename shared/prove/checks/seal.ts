import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { sealText } from "#shared/prove/seal.ts";
import { counted } from "#shared/prove/wording.ts";

/** The seal in the provenance line fits what that line says, and the lines of ours and the kept raises as they stand now. */
export function checkSeal(evidence: Evidence, digest: (text: string) => string): Check {
  const { facts } = evidence.provenance;
  const found = `The seal fits the provenance line, ${counted(evidence.own.length, "command")} of ours and the raises kept, each in its place.`;
  if (!facts) return verdict("seal", "There is no provenance line that could be read for a seal.", found);
  const text = sealText(facts, evidence.comparison, (entry) => evidence.isKept(entry));
  const problem =
    digest(text) === facts.seal
      ? undefined
      : "The seal does not fit: the provenance line, a line of ours or a kept raise was changed, moved, added or taken out since.";
  return verdict("seal", problem, found);
}
