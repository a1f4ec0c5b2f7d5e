import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";

/** Lines of ours stand between the start of the first layer and the end of the last, at boundaries that the reading knows. */
export function checkInsertedInside(evidence: Evidence): Check {
  const { own, events, reading } = evidence;
  const { start, end } = reading.window;
  const found = `All lines of ours stand between line ${start.line} of the original, where the first layer begins, and line ${end.line}, where the last has ended.`;
  const outside = own.find(({ from, to }) => to < start.offset || from > end.offset);
  if (outside)
    return verdict(
      "inserted-inside",
      `\`${outside.code}\` at ${evidence.place(outside)} stands outside the layers.`,
      found,
    );
  const lost = events.flat().find(({ entry, timeS }) => entry.what === "own" && Number.isNaN(timeS));
  const problem = lost && `\`${lost.entry.code}\` at ${evidence.place(lost.entry)} stands where no command may be put.`;
  return verdict("inserted-inside", problem, found);
}
