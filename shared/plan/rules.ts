import type { CurveOver, Rule, Zone } from "#shared/formats/profile.ts";
import type { PlacedLayer } from "#shared/plan/layer-placer.ts";
import type { PlanLayer } from "#shared/plan/plan.ts";
import { dutyText, givenText, heightText, tenthsText } from "#shared/plan/quantity-text.ts";

/** A zone's rule for one channel, made ready to be asked thousands of times. */
export type ReadyRule = FixedRule | CurveRule | HeldRule;

/** Duties that were solved from the target. */
export interface HeldRule {
  kind: "held";
  /** by position in print order, 0-1; above the zone its highest layer's goes on */
  duty: Float64Array;
  /** what the duty was chosen for, e.g. `zone lip: held amorphous at 113 °C` */
  reason: (position: number) => string;
}

/** Finds the solved duties of a channel in a zone. */
export type Held = (channel: string, zone: number) => HeldRule;

export interface FixedRule {
  kind: "fixed";
  duty: number;
  /** the whole reason, e.g. `zone base: fixed at 0.62` */
  reason: string;
}

export interface CurveRule {
  kind: "curve";
  over: CurveOver;
  /** ascending, s or mm */
  x: Float64Array;
  /** 0-1 */
  duty: Float64Array;
  /** the reason up to the quantity, e.g. `zone base: curve over layer time at ` */
  lead: string;
}

const OVER_TEXT = { "layer-time": "layer time", "deposited-length": "deposited length", height: "height" } as const;

/**
 * Makes the rule of one channel in one zone ready.
 *
 * @param z index of the zone
 */
export function readyRule(zone: Zone, z: number, rule: Rule, held: Held): ReadyRule {
  if (rule.rule === "fixed") {
    return { kind: "fixed", duty: rule.duty, reason: `zone ${zone.name}: fixed at ${givenText(rule.duty)}` };
  }
  if (rule.rule === "hold") return held(rule.channel, z);
  return {
    kind: "curve",
    over: rule.over,
    x: Float64Array.from(rule.points, ([x]) => x),
    duty: Float64Array.from(rule.points, ([, duty]) => duty),
    lead: `zone ${zone.name}: curve over ${OVER_TEXT[rule.over]} at `,
  };
}

/**
 * The rule's duty for a layer, before any ramp or limit.
 *
 * @param heightUm height at which a curve over height is read: the layer's top, or a zone's border, micrometres
 * @returns 0-1, always a number
 */
export function ruleDuty(rule: ReadyRule, { layer, position }: PlacedLayer, heightUm: number): number {
  if (rule.kind === "fixed") return rule.duty;
  if (rule.kind === "held") return rule.duty[position];
  return interpolate(rule.x, rule.duty, curveInput(rule.over, layer, heightUm));
}

/** Which rule gave which duty, e.g. `zone base: curve over layer time at 7.2 s → 0.42`. */
export function ruleReason(rule: ReadyRule, placed: PlacedLayer, duty: number): string {
  if (rule.kind === "fixed") return rule.reason;
  const { layer, position, heightUm } = placed;
  if (rule.kind === "held") return `${rule.reason(position)} → ${dutyText(duty)}`;
  const { over, lead } = rule;
  const at = over === "height" ? heightText(heightUm) : tenthsText(curveInput(over, layer, heightUm));
  return lead + (at + (over === "layer-time" ? " s → " : " mm → ") + dutyText(duty));
}

/** What a curve is read at, s or mm. A time or length that is unknown or below 0 counts as 0: the shortest layer. */
export function curveInput(over: CurveOver, layer: PlanLayer, heightUm: number): number {
  const value = over === "layer-time" ? layer.timeS : over === "height" ? heightUm / 1000 : layer.depositedLengthMm;
  return Number.isNaN(value) ? 0 : Math.max(value, 0);
}

/**
 * Piecewise linear through the points, held flat before the first and after the last.
 *
 * @param x ascending, at least one
 */
export function interpolate(x: Float64Array, y: Float64Array, at: number): number {
  const last = x.length - 1;
  if (!(at > x[0])) return y[0];
  if (at >= x[last]) return y[last];
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (at >= x[middle]) low = middle;
    else high = middle;
  }
  return y[low] + ((y[high] - y[low]) * (at - x[low])) / (x[high] - x[low]);
}
