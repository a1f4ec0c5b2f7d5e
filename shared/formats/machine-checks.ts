import type { z } from "zod";
import type { Channel, Drive, Machine, Pause } from "#shared/formats/machine.ts";

/**
 * One output of the machine as a key: channels with equal keys would fight over it. Names are compared without case,
 * which differs between firmwares.
 */
export function outputKey(drive: Drive): string {
  switch (drive.by) {
    case "fan-index":
      return `fan-index ${drive.index}`;
    case "pin":
      return `pin ${drive.pin}`;
    case "named-fan":
    case "named-pin":
      return `${drive.by} ${drive.name.toLowerCase()}`;
  }
}

/** What must hold within one channel. */
export function checkChannel(channel: Channel, context: z.core.$RefinementCtx): void {
  const report = (field: string, message: string) =>
    context.addIssue({ code: "custom", path: [field], message, input: channel });
  const { minDuty, maxDuty, idleDuty } = channel;
  if (minDuty > maxDuty) {
    report("minDuty", `is ${minDuty}, above maxDuty ${maxDuty}. Lower minDuty or raise maxDuty`);
  }
  if (idleDuty > maxDuty) {
    report("idleDuty", `is ${idleDuty}, above maxDuty ${maxDuty}. Lower idleDuty or raise maxDuty`);
  }
  if (idleDuty > 0 && idleDuty < minDuty) {
    report("idleDuty", `is ${idleDuty}, between off and minDuty ${minDuty}. Give 0 or at least minDuty`);
  }
  if (channel.kind === "fan" && idleDuty > 0) {
    report("idleDuty", "is for heaters, and this channel is a fan. Leave it out");
  }
  // Full power at the start would pass a lamp's maxDuty.
  if (channel.kind === "heater" && channel.startBoostS > 0) {
    report("startBoostS", "is for fans, and this channel is a heater. Leave it out");
  }
}

/** What must hold between the channels of a machine. */
export function checkChannels(channels: readonly Channel[], context: z.core.$RefinementCtx): void {
  const ids = new Map<string, number>();
  const outputs = new Map<string, number>();
  channels.forEach((channel, i) => {
    const sameId = ids.get(channel.id);
    if (sameId !== undefined) {
      const message = `"${channel.id}" is already the id of channels[${sameId}]. Give every channel its own id`;
      context.addIssue({ code: "custom", path: [i, "id"], message, input: channels });
    } else ids.set(channel.id, i);

    const output = outputKey(channel.drive);
    const sameOutput = outputs.get(output);
    if (sameOutput !== undefined) {
      const message = `is the output of channels[${sameOutput}] (${output}) too. Give every output one channel only`;
      context.addIssue({ code: "custom", path: [i, "drive"], message, input: channels });
    } else outputs.set(output, i);
  });
}

/** A pause form is listed once, or it would be unclear whether it blocks. */
export function checkPauses(pauses: readonly Pause[], context: z.core.$RefinementCtx): void {
  const seen = new Map<string, number>();
  pauses.forEach(({ command }, i) => {
    const earlier = seen.get(command.toUpperCase());
    if (earlier !== undefined) {
      const message = `"${command}" is listed already at pauses[${earlier}]. List every command once`;
      context.addIssue({ code: "custom", path: [i, "command"], message, input: pauses });
    } else seen.set(command.toUpperCase(), i);
  });
}

/** The surroundings speak of channels that are there: fans that cool, heaters that heat. */
export function checkThermal({ channels, thermal }: Machine, context: z.core.$RefinementCtx): void {
  const check = (ids: readonly string[], kind: Channel["kind"], path: readonly string[]) => {
    for (const id of ids) {
      if (channels.some((channel) => channel.id === id && channel.kind === kind)) continue;
      const message = `names no ${kind} of this machine. Use the id of one of its channels`;
      context.addIssue({ code: "custom", path: ["thermal", ...path, id], message, input: thermal });
    }
  };
  check(Object.keys(thermal?.convection?.fans ?? {}), "fan", ["convection", "fans"]);
  check(Object.keys(thermal?.lamps ?? {}), "heater", ["lamps"]);
}
