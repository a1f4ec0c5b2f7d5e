import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { durationText } from "#shared/units/words.ts";

/** Follows from the other checks: what was put in and taken out neither moves nor waits, and all else is in its order. */
export function checkMotion(evidence: Evidence, others: readonly Check[]): Check {
  const needed = ["bytes-kept", "removed-only-driven", "inserted-legal"];
  const failed = others.find(({ id, passed }) => !passed && needed.includes(id));
  const { printTimeS } = evidence.reading.totals;
  const found = `No line put in or taken out moves, waits or dwells, so motion is the same and print time stays ${durationText(printTimeS)}.`;
  return verdict("motion", failed && `Cannot be said, since ${failed.id} failed.`, found);
}
