import type { Check } from "#shared/formats/proof.ts";

/**
 * One check of the proof.
 *
 * @param problem what is wrong, with its place; undefined when nothing is
 * @param found what was found when nothing is wrong
 */
export function verdict(id: string, problem: string | undefined, found: string): Check {
  return { id, passed: problem === undefined, detail: problem ?? found };
}
