import type { Channel } from "#shared/formats/machine.ts";
import type { ControlLine } from "#shared/layers/reading.ts";
import type { DutyEvent, Evidence } from "#shared/prove/evidence.ts";
import { dutySteps } from "#shared/units/duty.ts";

const TOLERANCE = 1e-6;

/**
 * The first raise of a fan inside a layer that the tuned file does not carry out. A raise is a command behind the layer's
 * first laying move, above what the file has in force there and above the plan; up to the limit it has to be in force
 * behind its place, as it stands or cut.
 *
 * @param events what sets the channel in the tuned file, in order
 */
export function missingRaise(
  { reading, limits }: { reading: Evidence["reading"]; limits: { maxDuty: number } },
  channel: Channel,
  index: number,
  events: readonly DutyEvent[],
): ControlLine | undefined {
  const { layers, window, controls } = reading;
  const steps = dutySteps(channel.drive);
  const highest = Math.floor((limits.maxDuty + TOLERANCE / steps) * steps) / steps;
  let layer = 0;
  let base = 0;
  let fileDuty = 0;
  let next = 0;
  let planned = 0;
  let inForce = 0;
  for (const line of controls) {
    if (line.channel !== index || line.does !== "duty") continue;
    if (line.offset >= window.end.offset) return undefined;
    while (layer < layers.length && layers[layer].firstByte <= line.offset) {
      layer++;
      base = fileDuty;
    }
    fileDuty = line.duty;
    for (; next < events.length && events[next].entry.to < line.offset; next++) {
      inForce = events[next].duty;
      if (events[next].source === "plan") planned = inForce;
    }
    // Where another duty of the plan is written at the very place, a raise may end there as it begins.
    let most = inForce;
    let mostPlanned = planned;
    for (let k = next; k < events.length && events[k].entry.from <= line.offset; k++) {
      most = Math.max(most, events[k].duty);
      if (events[k].source === "plan") mostPlanned = Math.max(mostPlanned, events[k].duty);
    }
    const inBody = layer > 0 && line.offset < (layers[layer]?.writeAt.offset ?? window.end.offset);
    const raises = line.duty > base + TOLERANCE && line.duty > mostPlanned + TOLERANCE;
    if (inBody && raises && line.ours !== "plan" && most < Math.min(line.duty, highest) - TOLERANCE) return line;
  }
  return undefined;
}
