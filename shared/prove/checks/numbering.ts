import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { counted } from "#shared/prove/wording.ts";

/** In a numbered file every number from the first edit on follows the one before, and every checksum is right. */
export function checkNumbering({ comparison }: Evidence): Check {
  const { followed, wrong } = comparison.numbering;
  const problem = wrong && `Line ${wrong.tunedLine} of the tuned file: ${wrong.message}.`;
  const found = `${counted(followed, "line number")} from the first edit on without a gap, every checksum right.`;
  return verdict("numbering", problem, found);
}
