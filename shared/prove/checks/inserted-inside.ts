import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";

/** Print times are sums of floating-point durations, s. */
const SAME_S = 1e-6;

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
  for (const channelEvents of events) {
    let beforeS = 0;
    for (const { entry, timeS } of channelEvents) {
      if (entry.what !== "own") continue;
      const place = `\`${entry.code}\` at ${evidence.place(entry)}`;
      if (Number.isNaN(timeS)) return verdict("inserted-inside", `${place} stands where no command may be put.`, found);
      if (timeS < beforeS - SAME_S)
        return verdict("inserted-inside", `${place} has an earlier print time than the line of ours before it.`, found);
      beforeS = timeS;
    }
  }
  return verdict("inserted-inside", undefined, found);
}
