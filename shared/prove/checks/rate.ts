import type { Channel } from "#shared/formats/machine.ts";
import type { Check } from "#shared/formats/proof.ts";
import type { DutyLimits } from "#shared/plan/limits.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { DutyEvent, Evidence } from "#shared/prove/evidence.ts";
import { withoutBoosts } from "#shared/prove/start-boosts.ts";
import { dutyWords } from "#shared/prove/wording.ts";
import { dutySteps } from "#shared/units/duty.ts";

/** Print times are sums of floating-point durations, s. */
const SAME_S = 1e-6;
const SAME = 1e-9;

/**
 * The largest change per second is held, over every second as a whole; where it is less than a step of the output,
 * single steps stand further apart. A heater may fall at once, to idle at a pause and off behind the last layer. A fan
 * may jump over its dead band, to its start boost, and into and out of a raise of the file.
 */
export function checkRate(evidence: Evidence): Check {
  const said: string[] = [];
  for (const { channel, index } of evidence.channels()) {
    const limits = evidence.limits(channel);
    const { maxDutyPerS } = limits;
    if (!Number.isFinite(maxDutyPerS)) continue;
    const problem = problemOf(evidence, channel, { limits, index });
    if (problem !== undefined) return verdict("rate", problem, "");
    said.push(`${channel.id} changes by at most ${maxDutyPerS} a second`);
  }
  return verdict("rate", undefined, `${said.join("; ") || "No driven channel has a largest change per second"}.`);
}

function problemOf(
  evidence: Evidence,
  channel: Channel,
  { limits, index }: { limits: DutyLimits; index: number },
): string | undefined {
  const { maxDutyPerS, maxDuty } = limits;
  const step = 1 / dutySteps(channel.drive);
  // What the file has set above the limit comes down to the limit at once.
  let duty = Math.min(evidence.dutyBefore(index), maxDuty);
  /** the file's own duty may lie between two steps */
  let slack = step / 2;
  let sinceS = Number.NEGATIVE_INFINITY;
  let lastEnd = 0;
  let recent: { timeS: number; change: number }[] = [];
  const planned = evidence.events[index].filter(({ source }) => source === "plan");
  for (const event of withoutBoosts(planned, channel, limits)) {
    const { entry, timeS } = event;
    const change = Math.abs(event.duty - duty);
    if (change === 0) continue;
    // At a pause time goes on that is no print time.
    if (evidence.pauseWithin(lastEnd, entry.from - 1)) {
      recent = [];
      sinceS = Number.NEGATIVE_INFINITY;
    }
    const exempt = isExempt(evidence, channel, event, duty);
    recent = exempt ? [] : recent.filter((earlier) => earlier.timeS > timeS - 1 + SAME_S);
    if (!exempt) recent.push({ timeS, change });
    const inASecond = recent.reduce((sum, earlier) => sum + earlier.change, 0);
    const isSlowStep = change < step + SAME && change <= maxDutyPerS * (timeS - sinceS + SAME_S);
    if (inASecond > maxDutyPerS + slack + SAME && !isSlowStep)
      return `${channel.id} changes from ${dutyWords(duty)} to ${dutyWords(event.duty)} at ${evidence.place(entry)}, together ${dutyWords(inASecond)} within a second; ${maxDutyPerS} is allowed.`;
    duty = event.duty;
    slack = 0;
    sinceS = exempt ? Number.NEGATIVE_INFINITY : timeS;
    lastEnd = entry.to;
  }
  return undefined;
}

/** A fan may jump over its dead band; a heater may fall at once where it has to. */
function isExempt(evidence: Evidence, channel: Channel, { entry, duty }: DutyEvent, before: number): boolean {
  if (channel.kind === "fan") {
    const { minDuty } = evidence.limits(channel);
    return Math.min(duty, before) === 0 && Math.max(duty, before) < minDuty + 1 / dutySteps(channel.drive);
  }
  const { end } = evidence.reading.window;
  if (duty > before) return false;
  if (duty === 0 && entry.from <= end.offset && entry.to >= end.offset) return true;
  return duty <= channel.idleDuty + SAME && evidence.pauseWithin(entry.from, entry.to);
}
