import { type LayerRun, runText } from "#shared/plan/layer-runs.ts";
import type { AdviceCode } from "#shared/plan/plan.ts";
import { dutyText, givenText, tenthsText } from "#shared/plan/quantity-text.ts";
import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import type { CurveRule } from "#shared/plan/rules.ts";

/** Says what was noted, and what would help where fan and heater cannot. */
export function adviceText(code: AdviceCode, run: LayerRun, channel: ReadyChannel, zoneName: string): string {
  return `${runText(run)}: ${SENTENCES[code]({ run, channel, zoneName })}`;
}

interface Subject {
  run: LayerRun;
  channel: ReadyChannel;
  zoneName: string;
}

const SENTENCES: Record<AdviceCode, (subject: Subject) => string> = {
  "layer-time-unknown": ({ channel, zoneName }) =>
    `no layer time is known, so the curve of ${channel.id} in zone ${zoneName} is read at 0 s.`,

  "layer-too-short": (subject) => {
    const { first, unit } = curveOf(subject);
    const needed = unit === "s" ? ` to at least ${first} s` : "";
    return `${shortest(subject)}, and ${subject.channel.id} is at its limit of ${subject.channel.text.max}. Print more parts at once, or slow ${subject.run.count === 1 ? "the layer" : "these layers"} down${needed}.`;
  },

  "below-curve": (subject) =>
    `${shortest(subject)}; ${subject.channel.id} is held at ${dutyText(curveOf(subject).rule.duty[0])}. If shorter layers need more cooling, give the curve a point for them.`,

  "above-curve": (subject) => {
    const { rule } = curveOf(subject);
    const end = rule.x.length - 1;
    return `heights up to ${subject.run.most} mm lie above the last point (${rule.x[end]} mm) of the curve in zone ${subject.zoneName}; ${subject.channel.id} is held at ${dutyText(rule.duty[end])}.`;
  },

  saturated: ({ run, channel }) =>
    `the profile asks for up to ${dutyText(run.most)} of ${channel.id}, which may have at most ${channel.text.max}.`,

  "dead-band": ({ run, channel }) =>
    `the profile asks ${channel.id} for ${range(run)}, where it stalls; below ${channel.text.min} it is planned off or at ${channel.text.min}, whichever is nearer.`,

  "change-limited": ({ run, channel }) =>
    `the largest change of ${channel.text.perLayer} a layer keeps ${channel.id} up to ${dutyText(run.most)} away from its rule.`,

  "change-below-step": ({ channel }) =>
    `the largest change of ${channel.limits.maxDutyPerLayer} a layer is less than one step (1/${channel.steps}) of ${channel.id}, so it cannot follow its rule.`,

  "end-ramp-not-held": ({ run, channel }) =>
    `${channel.id} cannot keep to its end ramp and is still at ${dutyText(run.latest)} on layer ${run.last}. Make the ramp longer, or the limits of ${channel.id} wider.`,

  "rate-too-slow": ({ run, channel }) =>
    `the change of ${channel.id} takes ${run.most} s at ${givenText(channel.limits.maxDutyPerS)} a second, longer than the layer below lasts.`,
};

function curveOf({ run, channel }: Subject) {
  // Only layers on a curve are noted with a code that asks for it.
  const rule = channel.rules[run.zone] as CurveRule;
  const inTime = rule.over === "layer-time";
  return { rule, first: rule.x[0], quantity: inTime ? "layer time" : "deposited length", unit: inTime ? "s" : "mm" };
}

function shortest(subject: Subject): string {
  const { quantity, first, unit } = curveOf(subject);
  const least = tenthsText(subject.run.least);
  return `${quantity} down to ${least} ${unit}, below the first point (${first} ${unit}) of the curve in zone ${subject.zoneName}`;
}

function range({ least, most }: LayerRun): string {
  const [low, high] = [dutyText(least), dutyText(most)];
  return low === high ? low : `${low} to ${high}`;
}
