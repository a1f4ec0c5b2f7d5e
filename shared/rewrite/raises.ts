import type { Channel } from "#shared/formats/machine.ts";
import type { ControlLine } from "#shared/layers/reading.ts";
import { effectiveLimits } from "#shared/plan/limits.ts";
import type { ScheduleInput } from "#shared/rewrite/schedule.ts";
import { highestDuty, SAME, type Write } from "#shared/rewrite/write.ts";

/** What stays of a fan's own commands, and what is written because of them. */
export interface Raises {
  writes: Write[];
  kept: ReadonlySet<ControlLine>;
}

/**
 * Keeps the raises of a fan inside layers (bridges, overhangs) that lie above the plan. A raise is a command after the
 * layer's first laying move, above what the file had in force there and above the plan. It ends at the file's next lower
 * command in the layer, else where the next layer begins; what ends it is rewritten to the plan's duty. A raise above
 * the limit is rewritten to the limit.
 *
 * @param planned the channel's writes, in file order
 */
export function keepRaises(channel: Channel, input: ScheduleInput, planned: readonly Write[]): Raises {
  const { reading, machine, profile, boundaries } = input;
  const limits = effectiveLimits(channel, profile);
  const index = machine.channels.indexOf(channel);
  const mostDuty = highestDuty(channel, limits);
  const lines = reading.controls.filter((line) => line.channel === index && line.does === "duty");
  // Of a file tuned before, what was no raise is gone, and with it what its raises rose from.
  const tunedBefore = lines.some(({ ours }) => ours);
  const kept = new Set<ControlLine>();
  const writes: Write[] = [];
  let next = 0;
  let nextPlanned = 0;
  let inForce = 0; // the plan's duty
  let raisedAt = -1; // byte of the raise in force

  /** Takes over the plan's writes up to a byte; any of them ends a raise. */
  const planUpTo = (offset: number): void => {
    for (; nextPlanned < planned.length && planned[nextPlanned].offset <= offset; nextPlanned++) {
      writes.push(planned[nextPlanned]);
      inForce = planned[nextPlanned].duty;
      raisedAt = -1;
    }
  };
  const handle = (line: ControlLine, baseDuty: number): void => {
    planUpTo(line.offset);
    if (line.ours === "plan") return;
    const duty = Math.min(line.duty, mostDuty);
    const raises = line.duty > baseDuty + SAME && duty > inForce + SAME;
    if (raises && line.duty <= limits.maxDuty + SAME && line.ours === false) kept.add(line);
    else if (raises) writes.push({ ...placeOf(line), duty, tag: "raise" });
    else if (raisedAt >= 0) writes.push({ ...placeOf(line), duty: inForce, tag: "restore" });
    raisedAt = raises ? line.offset : -1;
  };

  let fileDuty = 0;
  for (const [k, layer] of reading.layers.entries()) {
    const start = boundaries.list[boundaries.at(layer.writeAt.offset)];
    planUpTo(start.offset);
    const end = raisedAt < start.offset ? start : layer.writeAt;
    if (raisedAt >= 0) writes.push({ ...end, duty: inForce, tag: "plan" });
    raisedAt = -1;
    // Commands before the layer's first laying move set the base that its raises rise from.
    for (; next < lines.length && lines[next].offset < layer.firstByte; next++) fileDuty = lines[next].duty;
    const baseDuty = tunedBefore ? 0 : fileDuty;
    const bodyEnd = reading.layers[k + 1]?.writeAt.offset ?? reading.window.end.offset;
    for (; next < lines.length && lines[next].offset < bodyEnd; next++) {
      handle(lines[next], baseDuty);
      fileDuty = lines[next].duty;
    }
  }
  planUpTo(Number.POSITIVE_INFINITY);
  return { writes, kept };
}

const placeOf = ({ offset, line, timeS }: ControlLine): Pick<Write, "offset" | "line" | "timeS"> => ({
  offset,
  line,
  timeS,
});
