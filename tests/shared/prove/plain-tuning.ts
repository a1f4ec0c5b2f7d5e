import { type Machine, writeMachine } from "#shared/formats/machine.ts";
import { type Profile, writeProfile } from "#shared/formats/profile.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { dutySteps } from "#shared/units/duty.ts";
import { bytesOf, ENGINE, readBytes, sha256 } from "#tests/shared/prove/proving.ts";
import { withChecksum } from "#tests/shared/prove/small-part.ts";

/**
 * A tuned file made for these tests alone, the simplest way there is: whole lines in memory, duties written at the start
 * of each layer, no leads and no staircases. The product's own way of writing has no part in it.
 */
export function plainTuning(original: string, machine: Machine, profile: Profile): string {
  const reading = readBytes(bytesOf(original), machine);
  const lines = linesOf(original);
  const own = ownCommands(reading, machine, profile);
  const gone = goneLines(reading, machine, profile);
  const tuned: string[] = [];
  let offset = lines[0]?.startsWith("\xef\xbb\xbf") ? 3 : 0;
  const newline = { lf: "\n", crlf: "\r\n", cr: "\r", mixed: "\n", none: "\n" }[reading.file.newline];
  for (const line of lines) {
    for (const command of own.get(offset) ?? []) tuned.push(command + newline);
    if (!gone.has(offset)) tuned.push(line);
    offset = offset === 3 && tuned.length === 1 ? line.length : offset + line.length;
  }
  const atEnd = [...own].filter(([at]) => at >= original.length).flatMap(([, commands]) => commands);
  if (atEnd.length > 0) {
    if (!reading.file.finalNewline) tuned[tuned.length - 1] += newline;
    tuned.push(...atEnd.map((command) => command + newline));
    if (!reading.file.finalNewline) tuned[tuned.length - 1] = atEnd[atEnd.length - 1];
  }
  return sealed(reading.file.numbered ? renumbered(tuned) : tuned, reading, machine, profile).join("");
}

/** A text cut behind every line end. */
export const linesOf = (text: string): string[] => text.match(/[^\r\n]*(?:\r\n|\r|\n)|[^\r\n]+$/g) ?? [];

const isOwn = (line: string): boolean => /;ql[+=]?[\r\n]*$/.test(line);
const isProvenance = (line: string): boolean => line.startsWith(";quenchline {");

function ownCommands(reading: Reading, machine: Machine, profile: Profile): Map<number, string[]> {
  const { layers, window, pauses } = reading;
  const plan = planDuties({ layers, machine, profile });
  const own = new Map<number, string[]>([[window.start.offset, [";quenchline {}"]]]);
  const put = (offset: number, command: string, tag = ";ql"): void => {
    own.set(offset, [...(own.get(offset) ?? []), `${command} ${tag}`]);
  };
  for (const [index, channel] of machine.channels.entries()) {
    if (!(channel.id in plan.layers[0].duty)) continue;
    const write = (duty: number): string => commandFor(channel.drive, duty);
    const kept =
      profile.withinLayer === "keep-raises" && channel.kind === "fan"
        ? reading.controls.filter((line) => line.channel === index && line.layer >= 1 && Number.isFinite(line.layer))
        : [];
    let inForce = -1;
    for (const [k, layer] of layers.entries()) {
      const duty = plan.layers[k].duty[channel.id];
      if (duty !== inForce) put(layer.writeAt.offset, write(duty));
      inForce = duty;
      let raised = false;
      for (const line of kept.filter((control) => control.layer === layer.index && control.offset > layer.firstByte)) {
        if (line.duty > duty && line.duty > channel.maxDuty)
          put(
            line.offset,
            write(Math.floor(channel.maxDuty * dutySteps(channel.drive)) / dutySteps(channel.drive)),
            ";ql+",
          );
        else if (line.duty <= duty && raised) put(line.offset, write(duty), ";ql=");
        raised = line.duty > duty;
        if (raised) inForce = -1;
      }
    }
    if (channel.kind !== "heater") continue;
    for (const { offset, length, layer, command } of pauses) {
      if (layer < 1 || layer > layers.length) continue;
      put(offset, write(0));
      if (command === "M0") put(offset + length, write(plan.layers[layer - 1].duty[channel.id]));
    }
    put(window.end.offset, write(0));
  }
  return own;
}

function commandFor(drive: Machine["channels"][number]["drive"], duty: number): string {
  if (drive.by === "named-fan") return `SET_FAN_SPEED FAN=${drive.name} SPEED=${Math.round(duty * 1000) / 1000}`;
  if (drive.by === "named-pin") return `SET_PIN PIN=${drive.name} VALUE=${Math.round(duty * 1000) / 1000}`;
  if (drive.by === "pin") return `M42 P${drive.pin} S${Math.round(duty * 255)}`;
  return `M106${drive.index === 0 ? "" : ` P${drive.index}`} S${Math.round(duty * 255)}`;
}

/** Offsets of the file's own commands that the tuning takes out. */
function goneLines(reading: Reading, machine: Machine, profile: Profile): Set<number> {
  const plan = planDuties({ layers: reading.layers, machine, profile });
  const gone = new Set<number>();
  for (const { channel, layer, does, duty, offset } of reading.controls) {
    const { id, kind, maxDuty } = machine.channels[channel];
    if (layer < 1 || layer > reading.layers.length || does !== "duty" || !(id in plan.layers[0].duty)) continue;
    const inBody = offset > reading.layers[layer - 1].firstByte;
    const stays =
      profile.withinLayer === "keep-raises" && kind === "fan" && inBody && duty > plan.layers[layer - 1].duty[id];
    if (!stays || duty > maxDuty) gone.add(offset);
  }
  return gone;
}

/** Numbers and checksums from the first line of ours on; a line that sets the counter stands as it is. */
export function renumbered(lines: readonly string[]): string[] {
  let last = 0;
  let edited = false;
  return lines.map((line) => {
    edited ||= isOwn(line) || isProvenance(line);
    const [, text, end] = /^([^\r\n]*)([\r\n]*)$/.exec(line)!;
    if (text.startsWith(";") || text === "") return line;
    const number = Number(/^N(\d+)/.exec(text)?.[1]);
    if (!edited) {
      last = number;
      return line;
    }
    const command = text.replace(/^N\d+ /, "").replace(/\*\d+(?=( ;.*)?$)/, "");
    return withChecksum(`N${++last} ${command}`) + end;
  });
}

/** The lines with a provenance line that fits them. */
export function sealed(lines: readonly string[], reading: Reading, machine: Machine, profile: Profile): string[] {
  const driven = machine.channels.filter(({ id }) =>
    profile.zones.some((zone) => [...zone.cooling, ...zone.heating].some((rule) => rule.channel === id)),
  );
  const words = { plan: ";ql", raise: ";ql+", restore: ";ql=" };
  const raises = profile.withinLayer === "keep-raises" && /^(M106 S|SET_FAN_SPEED FAN=part )/;
  let begun = false;
  let kept = 0;
  let commands = 0;
  let text = "";
  const lastOwn = lines.reduce((last, line, k) => (isOwn(line) ? k : last), -1);
  for (const [k, line] of lines.entries()) {
    begun ||= isProvenance(line);
    if (isProvenance(line)) continue;
    const code = line
      .replace(/[\r\n]+$/, "")
      .replace(/;.*$/, "")
      .trim()
      .replace(/^N\d+ /, "")
      .replace(/\*\d+$/, "");
    if (isOwn(line)) {
      const tag = Object.entries(words).find(([, comment]) =>
        line.replace(/[\r\n]+$/, "").endsWith(` ${comment}`),
      )?.[0];
      text += `${kept} ${tag} ${code}\n`;
      commands++;
      continue;
    }
    if (begun && raises && k < lastOwn && raises.test(code)) text += `${kept} kept ${code}\n`;
    kept++;
  }
  const facts = {
    v: 1,
    profile: { name: profile.name, sha256: sha256(writeProfile(profile)) },
    machine: { name: machine.name, sha256: sha256(writeMachine(machine)) },
    original: (reading.provenance?.data as { original?: string } | undefined)?.original ?? reading.file.sha256,
    engine: ENGINE,
    status: "trial-only",
    channels: driven.map(({ id }) => id),
    withinLayer: profile.withinLayer,
    lines: commands,
  };
  const written = (seal: string): string =>
    JSON.stringify({ ...facts, seal }).replace(/[^ -~]/g, (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, "0")}`);
  const json = written(sha256(`${written("")}\n${text}`));
  return lines.map((line) => (isProvenance(line) ? line.replace(/\{.*\}/, () => json) : line));
}
