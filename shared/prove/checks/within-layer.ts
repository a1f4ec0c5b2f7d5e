import type { Channel } from "#shared/formats/machine.ts";
import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { DutyEvent, Evidence } from "#shared/prove/evidence.ts";
import { missingRaise } from "#shared/prove/missing-raise.ts";
import { counted, dutyWords } from "#shared/prove/wording.ts";

const TOLERANCE = 1e-9;

/**
 * What is left of the file's own commands on driven channels inside the window. With `replace`, and for heaters always,
 * nothing. With `keep-raises` a fan's command stays only where it lies above the plan; one above the limit is cut to it,
 * and each ends before the next layer is under way.
 */
export function checkWithinLayer(evidence: Evidence): Check {
  const keeps = (evidence.profile?.withinLayer ?? evidence.provenance.facts?.withinLayer) === "keep-raises";
  const count = { kept: 0, raise: 0 };
  for (const { channel, index } of evidence.channels()) {
    const events = evidence.events[index];
    for (const { source } of events) if (source === "kept" || source === "raise") count[source]++;
    const problem =
      hiddenProblem(evidence, channel, events) ??
      raisesProblem(evidence, channel, events, keeps && channel.kind === "fan") ??
      (keeps && channel.kind === "fan" ? missingProblem(evidence, channel, index) : undefined);
    if (problem !== undefined) return verdict("within-layer", problem, "");
  }
  const found = keeps
    ? `${counted(count.kept, "raise")} of the file inside layers kept as it stands, ${count.raise} cut to a limit; each lies above the plan and ends with its layer.`
    : "None of the file's own commands on driven channels is left among the layers.";
  return verdict("within-layer", undefined, found);
}

/** A command that sets a duty and something else can neither be taken out nor stay. */
function hiddenProblem(evidence: Evidence, { id }: Channel, events: readonly DutyEvent[]): string | undefined {
  const hidden = events.find(
    ({ entry }) => entry.what === "file" && entry.set.does === "mixed" && evidence.isInside(entry.from),
  );
  return (
    hidden &&
    `\`${hidden.entry.code}\` at ${evidence.place(hidden.entry)} still sets ${id}, and does something else besides.`
  );
}

function missingProblem(evidence: Evidence, channel: Channel, index: number): string | undefined {
  const { reading, events } = evidence;
  const limits = evidence.limits(channel);
  const missing = missingRaise({ reading, limits }, channel, index, events[index]);
  return (
    missing &&
    `\`${missing.code}\` at line ${missing.line} of the original (${evidence.layerText(missing.offset)}) raises ${channel.id}, and the tuned file does not.`
  );
}

function raisesProblem(
  evidence: Evidence,
  { id }: Channel,
  events: readonly DutyEvent[],
  keeps: boolean,
): string | undefined {
  const { layers } = evidence.reading;
  let planned = 0;
  let raised: DutyEvent | undefined;
  for (const event of events) {
    const { source, entry, duty } = event;
    if (source === "file") continue;
    const place = `\`${entry.code}\` at ${evidence.place(entry)}`;
    if (source !== "plan" && !keeps) return `${place} sets ${id} inside a layer, where only the plan may.`;
    if (raised) {
      const next = layers[evidence.layersBy(raised.entry.from)]?.writeAt.offset ?? Number.POSITIVE_INFINITY;
      if (entry.from > next)
        return `${id} stays raised by \`${raised.entry.code}\` at ${evidence.place(raised.entry)} when the next layer begins.`;
    }
    if (source === "plan") planned = duty;
    if (source === "restore" && (!raised || Math.abs(duty - planned) > TOLERANCE))
      return `${place} should end a raise of ${id} at ${dutyWords(planned)}.`;
    const raises = source === "kept" || source === "raise";
    // Where the plan is at the limit already, a raise that is cut to the limit does not lie above it.
    if (raises && !(duty > planned + (source === "kept" ? TOLERANCE : -TOLERANCE)))
      return `${place} does not lie above ${dutyWords(planned)}, which is the plan of ${id} there.`;
    raised = raises ? event : undefined;
  }
  if (raised && layers[evidence.layersBy(raised.entry.from)])
    return `${id} stays raised by \`${raised.entry.code}\` at ${evidence.place(raised.entry)} when the next layer begins.`;
  return undefined;
}
