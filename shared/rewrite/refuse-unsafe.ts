import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { ControlLine, Reading } from "#shared/layers/reading.ts";
import { sharedOutputText } from "#shared/layers/shared-output.ts";
import type { Advice } from "#shared/plan/plan.ts";
import { Refusal } from "#shared/refusal.ts";

/**
 * Refuses a tuning whose commands would not do what the plan says, or that would leave a heater on.
 *
 * @param driven channels that the profile drives
 * @throws Refusal naming the line
 */
export function refuseUnsafe(reading: Reading, machine: Machine, driven: readonly Channel[], advice: Advice[]): void {
  const ids = new Set(driven.map((channel) => machine.channels.indexOf(channel)));
  refuseUnclear(reading);
  refuseHiddenDuty(reading, machine, ids);
  refuseFanElsewhere(reading, machine, driven);
  const heaters = driven.filter(({ kind }) => kind === "heater");
  for (const heater of heaters) {
    refuseSharedOutput(reading, heater, advice);
    refuseOnAfterEnd(reading, heater, machine.channels.indexOf(heater));
  }
  if (heaters.length > 0) refuseUnknownPause(reading, machine);
  refuseLeftOn(reading, machine, ids);
}

const inside = (line: { layer: number }): boolean => line.layer >= 1 && line.layer < Number.POSITIVE_INFINITY;

/** No one can tell what a line does that firmware families read in different ways. */
function refuseUnclear({ outputs: { unclear } }: Reading): void {
  if (!unclear) return;
  throw new Refusal(
    "unclear-command",
    `\`${unclear.code}\` is not one plain command, and firmware families disagree on which outputs it sets`,
    "Write each command on a line of its own, or take the line out, and tune again.",
    { line: unclear.line },
  );
}

/**
 * A plain fan command drives the part fan on every firmware family. Where the machine's fan is named otherwise, such a
 * command may drive the same fan between our lines, and nobody could tell.
 */
function refuseFanElsewhere({ outputs }: Reading, machine: Machine, driven: readonly Channel[]): void {
  const plain = outputs.foreign?.find(({ command }) => command === "M106");
  const fan = driven.find(({ kind }) => kind === "fan");
  if (!plain || !fan) return;
  throw new Refusal(
    "fan-elsewhere",
    `the file sets a fan with ${plain.command}, for which ${machine.name} has no channel: it may be ${fan.id} itself, and would go on changing it between our lines`,
    `Read the file for the machine that it was sliced for. Or say in the document of ${machine.name} what M106 drives: give ${fan.id} the drive "fan-index" 0, or add a channel for another fan.`,
    { line: plain.line },
  );
}

/** A line that sets a duty together with something else can neither stay nor go. */
function refuseHiddenDuty({ controls }: Reading, machine: Machine, ids: ReadonlySet<number>): void {
  const line = controls.find((control) => control.does === "mixed" && inside(control) && ids.has(control.channel));
  if (!line) return;
  throw new Refusal(
    "mixed-command",
    `\`${line.code}\` drives ${machine.channels[line.channel].id} and does something else besides, so it can neither stay nor be taken out`,
    "Split the line in two, or take it out, and tune again.",
    { line: line.line, layer: line.layer },
  );
}

/** Firmware that ignores the index of a fan command would send the heater's duty to the part fan (REFERENCE G13). */
function refuseSharedOutput({ outputs }: Reading, heater: Channel, advice: Advice[]): void {
  const { drive } = heater;
  if (drive.by !== "fan-index") return;
  if (drive.index === 0 && outputs.bareFanLine !== undefined)
    throw new Refusal(
      "output-shared",
      `${heater.id} is fan output 0, and this file sets fan output 0 with a plain fan command: the part fan's commands would drive the heater`,
      "Put the heater on an output of its own, and name it in the machine document.",
      { line: outputs.bareFanLine },
    );
  const { namedCommand, indexedFanLine } = outputs;
  if (drive.index === 0 || !namedCommand) return;
  if (indexedFanLine === undefined)
    throw new Refusal(
      "output-shared",
      `${namedCommand.name} belongs to a firmware family that ignores the P of M106: ${heater.id}'s command M106 P${drive.index} would drive the part fan`,
      `Drive ${heater.id} by a named pin in the machine document (drive.by "named-pin"), or use a file made for this machine.`,
      { line: namedCommand.line },
    );
  const message = sharedOutputText(outputs, heater);
  if (message !== undefined) advice.push({ layer: 1, code: "output-shared", message });
}

function refuseOnAfterEnd({ controls }: Reading, heater: Channel, index: number): void {
  const after = (line: ControlLine): boolean =>
    line.channel === index && line.layer === Number.POSITIVE_INFINITY && !line.ours;
  const line = controls.find((control) => after(control) && control.does !== "configuration" && !(control.duty === 0));
  if (!line) return;
  throw new Refusal(
    "heater-on-after-end",
    `\`${line.code}\` switches ${heater.id} on after the last layer`,
    `Take the line out of the end script: ${heater.id} has to stay off once the part is done.`,
    { line: line.line },
  );
}

function refuseUnknownPause({ pauses }: Reading, machine: Machine): void {
  const listed = new Set(machine.pauses.map(({ command }) => command.toUpperCase()));
  const pause = pauses.find((line) => inside(line) && !listed.has(line.command.toUpperCase()));
  if (!pause) return;
  throw new Refusal(
    "pause-unknown",
    `the file pauses with ${pause.command}, which the machine document does not list: whether the lamp may be lit again behind it is not known`,
    `Add ${pause.command} to the machine's pauses and say whether it blocks until the print goes on.`,
    { line: pause.line, layer: pause.layer },
  );
}

/** No heater of the machine may be on when the file ends, driven by us or not. */
function refuseLeftOn({ controls }: Reading, machine: Machine, driven: ReadonlySet<number>): void {
  for (const [index, channel] of machine.channels.entries()) {
    if (channel.kind !== "heater" || driven.has(index)) continue;
    const last = controls.filter((line) => line.channel === index && line.does !== "configuration").pop();
    if (!last || last.duty === 0) continue;
    throw new Refusal(
      "heater-left-on",
      `\`${last.code}\` is the last command of ${channel.id}: the file would end with it on`,
      `Switch ${channel.id} off in the end script, or let the profile drive it.`,
      { line: last.line },
    );
  }
}
