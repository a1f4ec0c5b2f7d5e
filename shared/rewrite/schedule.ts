import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { resolveLeadS } from "#shared/plan/lead.ts";
import { type DutyLimits, effectiveLimits } from "#shared/plan/limits.ts";
import type { Advice, Plan } from "#shared/plan/plan.ts";
import type { Boundaries } from "#shared/rewrite/boundaries.ts";
import { rateOf, staircase } from "#shared/rewrite/staircase.ts";
import type { Target, Write } from "#shared/rewrite/write.ts";
import { dutySteps } from "#shared/units/duty.ts";

export interface ScheduleInput {
  reading: Reading;
  boundaries: Boundaries;
  machine: Machine;
  profile: Profile;
  plan: Plan;
}

/** Two duties closer than this are the same; a drive's step is far larger. */
const SAME = 1e-6;

/**
 * Where each duty of one channel's plan is written: a pure time shift of the whole duty curve by the channel's lead,
 * snapped back to a line boundary, never before the window. A heater goes to its idle duty before each pause and off
 * after the last laying move.
 */
export function scheduleChannel(channel: Channel, input: ScheduleInput, advice: Advice[]): Write[] {
  const targets = wantedAt(channel, input);
  const limits = effectiveLimits(channel, input.profile);
  if (channel.kind === "heater") return followHeater(channel, targets, limits, input);
  const from = { duty: dutyBefore(channel, input), at: 0 };
  const { boundaries } = input;
  const writes = follow(channel, limits, boundaries, { from, targets, end: boundaries.list.length });
  return withStartBoost(channel, limits, atWindowStart(writes, targets, boundaries), input, advice);
}

/** The boundary of every layer's duty; of several that fall on one boundary the last stands. */
function wantedAt(channel: Channel, { reading, boundaries, profile, plan }: ScheduleInput): Target[] {
  const leadS = resolveLeadS(channel, profile);
  const targets: Target[] = [];
  for (const [k, layer] of reading.layers.entries()) {
    const at = leadS > 0 ? boundaries.lastBefore(layer.startsAtS - leadS) : boundaries.at(layer.writeAt.offset);
    const duty = plan.layers[k].duty[channel.id];
    const last = targets[targets.length - 1];
    if (last && last.at >= at) last.duty = duty;
    else targets.push({ at, duty });
  }
  return targets;
}

/** What the file itself has set before the window, 0 when nothing. */
export function dutyBefore(channel: Channel, { machine, reading }: Pick<ScheduleInput, "machine" | "reading">): number {
  const index = machine.channels.indexOf(channel);
  let duty = 0;
  for (const line of reading.controls)
    if (line.channel === index && line.layer === 0 && !line.ours && !Number.isNaN(line.duty)) duty = line.duty;
  return duty;
}

/** Part of the window without a pause in it: positions in the list of boundaries, [from.at, end). */
interface Stretch {
  from: { duty: number; at: number };
  targets: Target[];
  end: number;
}

function followHeater(channel: Channel, targets: Target[], limits: DutyLimits, input: ScheduleInput): Write[] {
  const { reading, boundaries, machine } = input;
  const { list } = boundaries;
  const writes: Write[] = [];
  let from = { duty: dutyBefore(channel, input), at: 0 };
  let resumed: Target[] = [];
  for (const pause of reading.pauses) {
    if (pause.layer < 1 || pause.layer > reading.layers.length) continue;
    const end = boundaries.at(pause.offset);
    const inside = targets.filter(({ at }) => at >= from.at && at < end);
    writes.push(...follow(channel, limits, boundaries, { from, targets: merged(resumed, inside), end }));
    const inForce = writes[writes.length - 1]?.duty ?? from.duty;
    const idle = Math.min(channel.idleDuty, inForce);
    if (inForce - idle > SAME) writes.push({ ...list[end], duty: idle, tag: "plan" });
    const after = boundaries.at(pause.offset + pause.length);
    const wanted = targets.filter(({ at }) => at < after).pop();
    resumed = wanted && blocks(machine, pause.command) ? [{ at: after, duty: wanted.duty }] : [];
    from = { duty: idle, at: after };
  }
  const inside = targets.filter(({ at }) => at >= from.at);
  writes.push(...follow(channel, limits, boundaries, { from, targets: merged(resumed, inside), end: list.length }));
  writes.push({ ...reading.window.end, duty: 0, tag: "plan" });
  return atWindowStart(writes, targets, boundaries);
}

/** A target at the very place of the resumed one replaces it. */
const merged = (resumed: Target[], inside: Target[]): Target[] =>
  resumed.length > 0 && inside[0]?.at === resumed[0].at ? inside : [...resumed, ...inside];

const blocks = (machine: Machine, command: string): boolean =>
  machine.pauses.some((pause) => pause.blocking && pause.command.toUpperCase() === command.toUpperCase());

function follow(
  channel: Channel,
  limits: DutyLimits,
  boundaries: Boundaries,
  { from, targets, end }: Stretch,
): Write[] {
  const { list } = boundaries;
  const driveSteps = dutySteps(channel.drive);
  const steps = Number.isFinite(limits.maxDutyPerS)
    ? staircase(boundaries, from, targets, end, rateOf(limits.maxDutyPerS, driveSteps))
    : targets;
  const writes: Write[] = [];
  let inForce = from.duty;
  for (const { at, duty } of steps) {
    if (Math.abs(duty - inForce) > SAME) writes.push({ ...list[at], duty, tag: "plan" });
    inForce = duty;
  }
  return writes;
}

/** The file's own state before the window is only what its plain commands say: the first duty is always written. */
function atWindowStart(writes: Write[], targets: readonly Target[], { list }: Boundaries): Write[] {
  if (writes[0]?.offset === list[0].offset) return writes;
  return [{ ...list[0], duty: targets[0].duty, tag: "plan" }, ...writes];
}

/** Longest time that a fan may run at its start boost beyond what the machine asks for, s. */
const BOOST_SLACK_S = 2;

/**
 * A fan that starts from standstill gets full power for a moment. The boost stands at a boundary before the wanted one,
 * so that the planned duty is in force in time; where none is near, it is left to the firmware, with advice.
 */
function withStartBoost(
  channel: Channel,
  limits: DutyLimits,
  writes: Write[],
  input: ScheduleInput,
  advice: Advice[],
): Write[] {
  if (channel.startBoostS === 0) return writes;
  const { boundaries, reading } = input;
  const out: Write[] = [];
  const skipped: number[] = [];
  let before = dutyBefore(channel, input);
  for (const write of writes) {
    const starts = before < SAME && write.duty > SAME && write.duty < limits.maxDuty - SAME;
    before = write.duty;
    if (starts) {
      const at = boundaries.list[boundaries.lastBefore(write.timeS - channel.startBoostS)];
      const afterLast =
        out.length === 0 ? at.offset >= reading.window.start.offset : at.offset > out[out.length - 1].offset;
      const near = write.timeS - at.timeS <= channel.startBoostS + BOOST_SLACK_S;
      if (afterLast && near && at.offset < write.offset && at.timeS <= write.timeS - channel.startBoostS + SAME)
        out.push({ ...at, duty: limits.maxDuty, tag: "plan" });
      else skipped.push(layerAt(reading, write.offset));
    }
    out.push(write);
  }
  if (skipped.length > 0)
    advice.push({
      layer: skipped[0],
      code: "boost-left-out",
      message: `${channel.id} starts from standstill at ${skipped.length === 1 ? `layer ${skipped[0]}` : `${skipped.length} layers, the first of them ${skipped[0]},`} without a start boost: no line boundary near enough before it. Check that the fan starts at this duty by itself.`,
    });
  return out;
}

/** Index of the layer whose commands are written at or before a byte. */
function layerAt({ layers }: Reading, offset: number): number {
  const next = layers.findIndex(({ writeAt }) => writeAt.offset > offset);
  return layers[(next < 0 ? layers.length : Math.max(next, 1)) - 1].index;
}
