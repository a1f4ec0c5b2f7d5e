import type { Channel } from "#shared/formats/machine.ts";
import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { dutyWords, listed } from "#shared/prove/wording.ts";

/** Every driven heater is switched off by us behind the last layer, and nothing switches any heater on after that. */
export function checkOffAtEnd(evidence: Evidence): Check {
  const { machine, driven } = evidence;
  for (const [index, channel] of machine.channels.entries()) {
    if (channel.kind !== "heater") continue;
    const problem = driven.includes(index)
      ? drivenProblem(evidence, channel, index)
      : leftOnProblem(evidence, channel, index);
    if (problem !== undefined) return verdict("off-at-end", problem, "");
  }
  const names = evidence.channels("heater").map(({ channel }) => channel.id);
  const found =
    names.length === 0
      ? "No heater is driven, and none is left on."
      : `${listed(names)} off behind the last layer (line ${evidence.reading.window.end.line} of the original), and nothing switches a heater on after that.`;
  return verdict("off-at-end", undefined, found);
}

function drivenProblem(evidence: Evidence, { id }: Channel, index: number): string | undefined {
  const events = evidence.events[index];
  const last = events.map(({ entry }) => entry.what).lastIndexOf("own");
  if (last < 0) return `No line of ours switches ${id} off.`;
  const { entry, duty } = events[last];
  const end = evidence.reading.window.end.offset;
  if (duty !== 0 || entry.from > end || entry.to < end)
    return `The last command of ours for ${id}, at ${evidence.place(entry)}, sets it to ${dutyWords(duty)}; it has to be off behind the last layer.`;
  const later = events.slice(last + 1).find((event) => !(event.duty === 0));
  return later && `${id} is set to ${dutyWords(later.duty)} again at ${evidence.place(later.entry)}.`;
}

function leftOnProblem(evidence: Evidence, { id }: Channel, index: number): string | undefined {
  const last = evidence.events[index].at(-1);
  if (!last || last.duty === 0) return undefined;
  return `The file leaves ${id} on: its last command, at ${evidence.place(last.entry)}, sets it to ${dutyWords(last.duty)}.`;
}
