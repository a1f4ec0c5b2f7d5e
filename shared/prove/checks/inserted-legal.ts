import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { OwnEntry } from "#shared/prove/comparison.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { counted, listed } from "#shared/prove/wording.ts";

/** Every command of ours is, to the letter, the one form in which a driven channel's duty is written. */
export function checkInsertedLegal(evidence: Evidence): Check {
  const { own, reading } = evidence;
  const names = evidence.channels().map(({ channel }) => channel.id);
  const found = `${counted(own.length, "command")} put in, each of ${listed(names) || "no channel"} in the machine's own form and resolution.`;
  const wrong = own.find((entry) => reasonAgainst(entry, evidence) !== undefined);
  if (wrong)
    return verdict(
      "inserted-legal",
      `\`${wrong.code}\` at ${evidence.place(wrong)}: ${reasonAgainst(wrong, evidence)}.`,
      found,
    );
  const stray = reading.outputs.strayOwnLine;
  const problem =
    stray === undefined ? undefined : `Line ${stray} of the original is a line of ours for another machine.`;
  return verdict("inserted-legal", problem, found);
}

function reasonAgainst({ set, problem }: OwnEntry, { machine, driven }: Evidence): string | undefined {
  if (problem !== undefined) return problem;
  if (!set) return "it is not a command of ours for any output of the machine";
  return driven.includes(set.channel) ? undefined : `it sets ${machine.channels[set.channel].id}, which is not driven`;
}
