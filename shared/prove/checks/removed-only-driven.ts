import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Removal } from "#shared/prove/comparison.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { counted, listed } from "#shared/prove/wording.ts";

/** What was taken out is a command that sets the duty of a driven channel inside the window, or ours. */
export function checkRemovedOnlyDriven(evidence: Evidence): Check {
  const { removals, removed } = evidence.comparison;
  const ours = removals.filter((removal) => removal.ours).reduce((sum, { lines }) => sum + lines, 0);
  const names = evidence.channels().map(({ channel }) => channel.id);
  const found = `${counted(removed - ours, "command")} of ${listed(names) || "no channel"} between first and last layer taken out${ours > 0 ? `, and ${counted(ours, "line")} of an earlier tuning` : ""}; nothing else.`;
  const wrong = removals.find((removal) => !removal.ours && reasonAgainst(removal, evidence) !== undefined);
  const problem =
    wrong && `Line ${wrong.firstLine} of the original was taken out, but it ${reasonAgainst(wrong, evidence)}.`;
  return verdict("removed-only-driven", problem, found);
}

function reasonAgainst({ channel, does, inWindow }: Removal, { machine, driven }: Evidence): string | undefined {
  if (channel < 0) return "sets no output of the machine";
  if (!driven.includes(channel)) return `sets ${machine.channels[channel].id}, which is not driven`;
  if (does === "configuration") return "carries settings instead of a duty";
  if (does === "mixed") return "does something else besides setting a duty";
  return inWindow ? undefined : "stands outside the layers";
}
