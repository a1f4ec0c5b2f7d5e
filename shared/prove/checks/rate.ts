import type { Channel } from "#shared/formats/machine.ts";
import type { Check } from "#shared/formats/proof.ts";
import type { DutyLimits } from "#shared/plan/limits.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { DutyEvent, Evidence } from "#shared/prove/evidence.ts";
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
    const problem = problemOf(evidence, channel, evidence.events[index], limits);
    if (problem !== undefined) return verdict("rate", problem, "");
    said.push(`${channel.id} changes by at most ${maxDutyPerS} a second`);
  }
  return verdict("rate", undefined, `${said.join("; ") || "No driven channel has a largest change per second"}.`);
}

function problemOf(
  evidence: Evidence,
  channel: Channel,
  events: readonly DutyEvent[],
  limits: DutyLimits,
): string | undefined {
  const { maxDutyPerS } = limits;
  const step = 1 / dutySteps(channel.drive);
  let duty = 0;
  let sinceS = Number.NEGATIVE_INFINITY;
  /** the file's own duty may lie between two steps */
  let slack = step / 2;
  let lastLine = 0;
  let recent: { timeS: number; change: number }[] = [];
  for (const event of events) {
    const { entry, timeS, source } = event;
    // What the file has set above the limit comes down to the limit at once.
    const before = Math.min(duty, limits.maxDuty);
    if (source === "file") duty = event.duty;
    if (source !== "plan" || event.duty === before) continue;
    duty = event.duty;
    // At a pause time goes on that is no print time.
    if (pauseBetween(evidence, lastLine, entry.tunedLine)) {
      recent = [];
      sinceS = Number.NEGATIVE_INFINITY;
    }
    const elapsedS = timeS - sinceS;
    sinceS = timeS;
    lastLine = entry.tunedLine;
    if (isExempt(evidence, channel, event, before)) {
      recent = [];
      sinceS = Number.NEGATIVE_INFINITY;
      slack = 0;
      continue;
    }
    const change = Math.abs(duty - before);
    recent = recent.filter((earlier) => earlier.timeS > timeS - 1 + SAME_S);
    recent.push({ timeS, change });
    const inASecond = recent.reduce((sum, earlier) => sum + earlier.change, 0);
    const slowSteps = change < step + SAME && maxDutyPerS * (elapsedS + SAME_S) >= change;
    if (inASecond > maxDutyPerS + slack + SAME && !slowSteps)
      return `${channel.id} changes from ${dutyWords(before)} to ${dutyWords(duty)} at ${evidence.place(entry)}, together ${dutyWords(inASecond)} within a second; ${maxDutyPerS} is allowed.`;
    slack = 0;
  }
  return undefined;
}

function pauseBetween({ pauses }: Evidence, firstLine: number, lastLine: number): boolean {
  return pauses.some(({ tunedLine }) => tunedLine > firstLine && tunedLine < lastLine);
}

function isExempt(evidence: Evidence, channel: Channel, { entry, duty }: DutyEvent, before: number): boolean {
  if (channel.kind === "fan") {
    const { minDuty, maxDuty } = evidence.limits(channel);
    const step = 1 / dutySteps(channel.drive);
    const deadBand = Math.min(duty, before) === 0 && Math.max(duty, before) < minDuty + step;
    return deadBand || (channel.startBoostS > 0 && Math.max(duty, before) > maxDuty - step);
  }
  const { end } = evidence.reading.window;
  if (duty > before) return false;
  if (duty === 0 && entry.from <= end.offset && entry.to >= end.offset) return true;
  return duty <= channel.idleDuty + SAME && evidence.pauses.some(({ from }) => entry.from <= from && from <= entry.to);
}
