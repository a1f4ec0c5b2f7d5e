import type { Channel } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Check } from "#shared/formats/proof.ts";
import type { Plan } from "#shared/plan/plan.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { DutyEvent, Evidence } from "#shared/prove/evidence.ts";
import { Instants } from "#shared/prove/instants.ts";
import { StaircaseRule } from "#shared/prove/staircase-rule.ts";
import { withoutBoosts } from "#shared/prove/start-boosts.ts";
import { type Target, targetsOf } from "#shared/prove/targets.ts";
import { counted, dutyWords, listed } from "#shared/prove/wording.ts";
import { dutySteps } from "#shared/units/duty.ts";

/**
 * The plan, computed afresh from reading and profile, is what the lines of ours carry out: every layer's duty is in force
 * at its instant, and no line sets another duty without a reason.
 */
export function checkPlan(evidence: Evidence, profile: Profile, plan: Plan | string): Check {
  if (typeof plan === "string") return verdict("plan", plan, "");
  const { reading, machine } = evidence;
  const instants = new Instants(reading, evidence.comparison.gaps);
  for (const { channel, index } of evidence.channels()) {
    const targets = targetsOf(channel, { reading, machine, profile, plan, instants });
    const limits = evidence.limits(channel);
    const planned = evidence.events[index].filter(({ source }) => source === "plan");
    const step = 1 / dutySteps(channel.drive);
    // Without a largest change per second a layer may want the very duty of a boost.
    const isWanted = ({ entry: { from, to }, duty }: DutyEvent): boolean =>
      limits.maxDutyPerS === Number.POSITIVE_INFINITY &&
      targets.some(({ offset, duty: wanted }) => offset >= from && offset <= to && Math.abs(wanted - duty) < step / 2);
    const events = changes(withoutBoosts(planned, channel, limits, isWanted));
    const initial = evidence.dutyBefore(index);
    const problem = new Course(evidence, channel, initial, events, targets, instants).problem();
    if (problem !== undefined) return verdict("plan", problem, "");
  }
  const names = evidence.channels().map(({ channel }) => channel.id);
  const found = `The plan was computed afresh: at every one of ${counted(reading.layers.length, "layer")} the duty of ${listed(names)} is in force when it is wanted.`;
  return verdict("plan", undefined, found);
}

/** What one channel's plan lines do over the print, against what is wanted. */
class Course {
  private readonly evidence: Evidence;
  private readonly channel: Channel;
  private readonly events: readonly DutyEvent[];
  private readonly targets: readonly Target[];
  private readonly staircase: StaircaseRule | undefined;
  private readonly halfStep: number;

  constructor(
    evidence: Evidence,
    channel: Channel,
    initial: number,
    events: readonly DutyEvent[],
    targets: readonly Target[],
    instants: Instants,
  ) {
    this.evidence = evidence;
    this.channel = channel;
    this.events = events;
    this.targets = targets;
    const { maxDutyPerS, minDuty } = evidence.limits(channel);
    const driveSteps = dutySteps(channel.drive);
    const pauses = evidence.pauses.map(({ from }) => from);
    this.halfStep = 0.5 / driveSteps;
    this.staircase = Number.isFinite(maxDutyPerS)
      ? new StaircaseRule({ maxDutyPerS, minDuty, driveSteps }, initial, events, targets, instants, pauses)
      : undefined;
  }

  problem(): string | undefined {
    return this.firstProblem() ?? this.targetProblem() ?? this.eventProblem();
  }

  private firstProblem(): string | undefined {
    const { offset } = this.evidence.reading.window.start;
    const first = this.events[0]?.entry;
    if (first && first.from <= offset && offset <= first.to) return undefined;
    return `No line of ours sets ${this.channel.id} where the first layer begins.`;
  }

  private targetProblem(): string | undefined {
    const { targets, events, channel, evidence } = this;
    let k = 0;
    for (const [i, { offset, duty, layer }] of targets.entries()) {
      while (k + 1 < events.length && events[k + 1].entry.from <= offset) k++;
      const { entry, duty: inForce } = events[k];
      // Where the next layer's duty stands at the same place, that one counts.
      if (i + 1 < targets.length && targets[i + 1].offset <= entry.to) continue;
      if (Math.abs(inForce - duty) < this.halfStep) continue;
      if (this.staircase?.behind(k, i) || this.staircase?.ahead(k, i)) continue;
      return `Layer ${layer} wants ${channel.id} at ${dutyWords(duty)}, but ${dutyWords(inForce)} is in force, set at ${evidence.place(entry)}.`;
    }
    return undefined;
  }

  private eventProblem(): string | undefined {
    const { targets, events, channel, evidence } = this;
    let i = 0;
    for (let k = 1; k < events.length; k++) {
      const { entry, duty } = events[k];
      // Of several at one place only the last has an effect.
      if (events[k + 1]?.entry.from === entry.from) continue;
      while (i + 1 < targets.length && targets[i + 1].offset <= entry.to) i++;
      const atTarget = targets[i].offset >= entry.from && targets[i].offset <= entry.to;
      if (atTarget || this.hasReason(k, i)) continue;
      return `\`${entry.code}\` at ${evidence.place(entry)} sets ${channel.id} to ${dutyWords(duty)} where no layer wants it.`;
    }
    return undefined;
  }

  private hasReason(k: number, i: number): boolean {
    const { entry, duty } = this.events[k];
    const before = this.events[k - 1].duty;
    if (Math.abs(duty - before) < this.halfStep) return true;
    if (this.channel.kind === "heater" && duty <= this.channel.idleDuty + this.halfStep) {
      const { end } = this.evidence.reading.window;
      if (entry.from <= end.offset && end.offset <= entry.to) return true;
      if (this.evidence.pauseWithin(entry.from, entry.to)) return true;
    }
    if (!this.staircase) return false;
    const wanted = this.targets[i].duty;
    return Math.abs(duty - wanted) < Math.abs(before - wanted) || this.staircase.ahead(k, i);
  }
}

/** Without the lines that repeat what is in force, such as those that only end a raise. */
function changes(events: readonly DutyEvent[]): readonly DutyEvent[] {
  return events.filter(({ duty }, k) => k === 0 || duty !== events[k - 1].duty);
}
