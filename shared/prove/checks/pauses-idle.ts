import type { Channel } from "#shared/formats/machine.ts";
import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { PauseEntry } from "#shared/prove/comparison.ts";
import type { DutyEvent, Evidence } from "#shared/prove/evidence.ts";
import { firstFrom } from "#shared/prove/known-times.ts";
import { type PauseForms, pauseForms } from "#shared/prove/pause-line.ts";
import { counted, dutyWords } from "#shared/prove/wording.ts";

/** A sum of duties may miss its value by the last digits. */
const TOLERANCE = 1e-9;

/**
 * At every pause among the layers each driven heater is idle. Behind a pause that the machine does not wait at, it stays
 * so until the next layer begins.
 */
export function checkPausesIdle(evidence: Evidence): Check {
  const forms = pauseForms(evidence.machine);
  const pauses = evidence.pauses.filter(({ from }) => evidence.isInside(from));
  const heaters = evidence.channels("heater");
  const found =
    pauses.length === 0
      ? "There is no pause among the layers."
      : heaters.length === 0
        ? `${counted(pauses.length, "pause")} among the layers; no heater is driven.`
        : `At ${counted(pauses.length, "pause")} among the layers every driven heater is idle.`;
  for (const pause of pauses)
    for (const { channel, index } of heaters) {
      const problem = problemAt(pause, evidence, channel, evidence.events[index], forms);
      if (problem !== undefined) return verdict("pauses-idle", problem, found);
    }
  return verdict("pauses-idle", undefined, found);
}

function problemAt(
  pause: PauseEntry,
  evidence: Evidence,
  { id, idleDuty }: Channel,
  events: readonly DutyEvent[],
  forms: PauseForms,
): string | undefined {
  const place = `the pause ${pause.command} at ${evidence.place(pause)}`;
  const form = forms.get(pause.command);
  if (form === undefined || form === "unlisted") return `The machine document does not list ${place}.`;
  const next = firstFrom(events.length, (k) => events[k].entry.tunedLine, pause.tunedLine);
  const before = events[next - 1];
  if (before && !(before.duty <= idleDuty + TOLERANCE))
    return `${id} is at ${dutyWords(before.duty)} at ${place}, its idle duty is ${dutyWords(idleDuty)}.`;
  if (form === "blocking") return undefined;
  const nextLayer = evidence.reading.layers[evidence.layersBy(pause.from)]?.writeAt.offset ?? Number.POSITIVE_INFINITY;
  let k = next;
  while (k < events.length && events[k].entry.to < nextLayer && events[k].duty <= idleDuty + TOLERANCE) k++;
  const early = events[k]?.entry.to < nextLayer ? events[k] : undefined;
  return (
    early &&
    `${id} is set to ${dutyWords(early.duty)} at ${evidence.place(early.entry)}, behind ${place}, which does not block.`
  );
}
