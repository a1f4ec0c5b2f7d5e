import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { resolveLeadS } from "#shared/plan/lead.ts";
import { type DutyLimits, effectiveLimits } from "#shared/plan/limits.ts";
import type { Advice, Plan } from "#shared/plan/plan.ts";
import type { Boundaries } from "#shared/rewrite/boundaries.ts";
import { rateOf, type Start, staircase } from "#shared/rewrite/staircase.ts";
import { highestDuty, SAME, type Target, type Write } from "#shared/rewrite/write.ts";
import { dutySteps, roundDutyInward } from "#shared/units/duty.ts";

export interface ScheduleInput {
  reading: Reading;
  boundaries: Boundaries;
  machine: Machine;
  profile: Profile;
  plan: Plan;
}

/**
 * Where each duty of one channel's plan is written: a pure time shift of the whole duty curve by the channel's lead,
 * snapped back to a line boundary, never before the window. A heater goes to its idle duty before each pause and off
 * after the last laying move.
 */
export function scheduleChannel(channel: Channel, input: ScheduleInput, advice: Advice[]): Write[] {
  const limits = effectiveLimits(channel, input.profile);
  const from = { duty: dutyBefore(channel, input), at: 0, sinceS: Number.NEGATIVE_INFINITY };
  const whole: Stretch = { from, targets: wantedAt(channel, input), end: input.boundaries.list.length };
  const writes =
    channel.kind === "heater" ? followHeater(channel, limits, whole, input) : follow(channel, limits, whole, input);
  return withStartBoost(channel, limits, fromWindowStart(writes, from.duty, input.boundaries), input, advice);
}

/** The boundary of every layer's duty, the first layer's being the window's start; of several at one the last stands. */
function wantedAt(channel: Channel, { reading, boundaries, profile, plan }: ScheduleInput): Target[] {
  const leadS = resolveLeadS(channel, profile);
  const targets: Target[] = [];
  for (const [k, layer] of reading.layers.entries()) {
    const at = leadS > 0 ? boundaries.lastBefore(layer.startsAtS - leadS) : boundaries.at(layer.writeAt.offset);
    const duty = plan.layers[k].duty[channel.id];
    const last = targets[targets.length - 1];
    if (last && last.at >= at) last.duty = duty;
    else targets.push({ at: k === 0 ? 0 : at, duty });
  }
  return targets;
}

/** What the file itself has set before the window, 0 when nothing. */
function dutyBefore(channel: Channel, { machine, reading }: ScheduleInput): number {
  const index = machine.channels.indexOf(channel);
  let duty = 0;
  for (const line of reading.controls)
    if (line.channel === index && line.layer === 0 && !line.ours && !Number.isNaN(line.duty)) duty = line.duty;
  return duty;
}

/** Part of the window without a pause in it: positions in the list of boundaries, [from.at, end). */
interface Stretch {
  from: Start;
  targets: readonly Target[];
  end: number;
}

/** Behind a pause that blocks, the lamp is lit again at once, behind any other with the next layer. */
function followHeater(channel: Channel, limits: DutyLimits, whole: Stretch, input: ScheduleInput): Write[] {
  const { reading, boundaries, machine } = input;
  const idleDuty = roundDutyInward(channel.idleDuty, dutySteps(channel.drive), 0, channel.idleDuty);
  const writes: Write[] = [];
  let { from, targets } = whole;
  for (const pause of reading.pauses) {
    if (pause.layer < 1 || pause.layer > reading.layers.length) continue;
    const end = boundaries.at(pause.offset);
    writes.push(...follow(channel, limits, { from, targets, end }, input));
    const last = writes[writes.length - 1] ?? { duty: from.duty, timeS: from.sinceS };
    const idle = Math.min(idleDuty, last.duty);
    const falls = last.duty - idle > SAME;
    if (falls) writes.push({ ...boundaries.list[end], duty: idle, tag: "plan" });
    const nextLayer =
      reading.layers.find(({ writeAt }) => writeAt.offset > pause.offset)?.writeAt ?? reading.window.end;
    const resumes = blocks(machine, pause.command) ? pause.offset + pause.length : nextLayer.offset;
    const resumesAt = Math.max(from.at, boundaries.at(resumes));
    from = { duty: idle, at: resumesAt, sinceS: falls ? Number.NEGATIVE_INFINITY : last.timeS };
    targets = wantedFrom(targets, resumesAt);
  }
  writes.push(...follow(channel, limits, { from, targets, end: whole.end }, input));
  return [...writes, { ...reading.window.end, duty: 0, tag: "plan" }];
}

/** The targets from a boundary on; what is wanted there is the first. */
function wantedFrom(targets: readonly Target[], at: number): Target[] {
  const later = targets.filter((target) => target.at > at);
  const wanted = targets[targets.length - later.length - 1];
  return wanted ? [{ at, duty: wanted.duty }, ...later] : later;
}

const blocks = (machine: Machine, command: string): boolean =>
  machine.pauses.some((pause) => pause.blocking && pause.command.toUpperCase() === command.toUpperCase());

function follow(
  channel: Channel,
  limits: DutyLimits,
  { from, targets, end }: Stretch,
  { boundaries }: ScheduleInput,
): Write[] {
  const reached = targets.filter(({ at }) => at < end);
  const steps = Number.isFinite(limits.maxDutyPerS)
    ? staircase(boundaries, from, reached, end, rateOf(channel, limits))
    : reached;
  const writes: Write[] = [];
  let inForce = from.duty;
  for (const { at, duty } of steps) {
    if (Math.abs(duty - inForce) > SAME) writes.push({ ...boundaries.list[at], duty, tag: "plan" });
    inForce = duty;
  }
  return writes;
}

/** What is in force before the window is only what the file's plain commands say: the first duty is always written. */
function fromWindowStart(writes: Write[], dutyBefore: number, { list }: Boundaries): Write[] {
  if (writes[0]?.offset === list[0].offset) return writes;
  return [{ ...list[0], duty: dutyBefore, tag: "plan" }, ...writes];
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
  const fullDuty = highestDuty(channel, limits);
  const out: Write[] = [];
  const skipped: number[] = [];
  let before = dutyBefore(channel, input);
  for (const write of writes) {
    const starts = before < SAME && write.duty > SAME && write.duty < fullDuty - SAME;
    before = write.duty;
    if (starts) {
      const at = boundaries.list[boundaries.lastBefore(write.timeS - channel.startBoostS)];
      const sinceS = write.timeS - at.timeS;
      const near = sinceS >= channel.startBoostS - SAME && sinceS <= channel.startBoostS + BOOST_SLACK_S;
      const last = out[out.length - 1];
      if (near && last && at.offset > last.offset) out.push({ ...at, duty: fullDuty, tag: "plan" });
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
