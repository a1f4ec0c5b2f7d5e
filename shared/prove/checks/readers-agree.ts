import type { Check } from "#shared/formats/proof.ts";
import { differencePlace } from "#shared/prove/checks/bytes-kept.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { counted } from "#shared/prove/wording.ts";

/** The reading that the tuning was made from and this second reader find the same commands of outputs, and pauses. */
export function checkReadersAgree(evidence: Evidence): Check {
  const { disagreement, agreed } = evidence.comparison;
  const problem = disagreement && `${sentence(differencePlace(evidence, disagreement))}: ${disagreement.message}.`;
  return verdict(
    "readers-agree",
    problem,
    `Two readers find the same ${counted(agreed, "output command or pause", "output commands and pauses")} in the original.`,
  );
}

const sentence = (text: string): string => text[0].toUpperCase() + text.slice(1);
