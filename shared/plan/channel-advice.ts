import { adviceText } from "#shared/plan/advice-text.ts";
import type { Decision } from "#shared/plan/decide-duty.ts";
import { inEndRamp } from "#shared/plan/end-ramp.ts";
import type { PlacedLayer } from "#shared/plan/layer-placer.ts";
import { LayerRuns } from "#shared/plan/layer-runs.ts";
import type { Advice, AdviceCode } from "#shared/plan/plan.ts";
import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import { curveInput } from "#shared/plan/rules.ts";

/** A layer this far from its rule is worth a word, duty 0-1. */
const WORTH_SAYING = 0.05;

/** Gathers what one channel cannot do for the print, layer by layer, in print order. */
export class ChannelAdvice {
  private readonly noted = new Map<AdviceCode, LayerRuns>();
  private readonly channel: ReadyChannel;
  private readonly step: number;
  private below: PlacedLayer | undefined;
  private dutyBelow = 0;

  constructor(channel: ReadyChannel) {
    this.channel = channel;
    this.step = 1 / channel.steps;
  }

  noteLayer(placed: PlacedLayer, decision: Decision): void {
    if (placed.rank > this.channel.bedCount) this.noteCurve(placed, decision);
    this.noteLimits(placed, decision);
    this.noteChange(placed, decision);
    if (this.below !== undefined) this.noteRate(placed, decision.duty, this.below);
    this.below = placed;
    this.dutyBelow = decision.duty;
  }

  /** Everything noted, one entry a run. */
  advice(zoneNames: readonly string[]): Advice[] {
    return [...this.noted].flatMap(([code, { runs }]) =>
      runs.map((run) => ({
        layer: run.first,
        code,
        message: adviceText(code, run, this.channel, zoneNames[run.zone]),
      })),
    );
  }

  private note(code: AdviceCode, placed: PlacedLayer, amount: number): void {
    let runs = this.noted.get(code);
    if (runs === undefined) {
      runs = new LayerRuns();
      this.noted.set(code, runs);
    }
    runs.note(placed, amount);
  }

  /** Layers outside the points of their curve. */
  private noteCurve(placed: PlacedLayer, { duty }: Decision): void {
    const { kind, rules, mostDuty } = this.channel;
    const rule = rules[placed.zone];
    if (rule.kind !== "curve") return;
    const input = curveInput(rule.over, placed.layer, placed.heightUm);
    if (rule.over === "height") {
      if (input > rule.x[rule.x.length - 1]) this.note("above-curve", placed, input);
    } else if (rule.over === "layer-time" && !(placed.layer.timeS > 0)) {
      this.note("layer-time-unknown", placed, input);
    } else if (kind === "fan" && input < rule.x[0]) {
      this.note(duty >= mostDuty ? "layer-too-short" : "below-curve", placed, input);
    }
  }

  /** Duties that the channel's lowest and highest keep from what the rule asks for. */
  private noteLimits(placed: PlacedLayer, { wanted }: Decision): void {
    const { kind, limits } = this.channel;
    if (wanted > limits.maxDuty + this.step) this.note("saturated", placed, wanted);
    if (kind === "fan" && wanted > 0 && wanted < limits.minDuty) this.note("dead-band", placed, wanted);
  }

  /** Duties that the largest change from layer to layer keeps behind. */
  private noteChange(placed: PlacedLayer, { wanted, allowed, duty }: Decision): void {
    const { limits, steps } = this.channel;
    const distance = Math.abs(allowed - duty);
    if (inEndRamp(this.channel, placed)) {
      const goal = limits.mayBeOff ? allowed : wanted;
      if (duty > goal + this.step) this.note("end-ramp-not-held", placed, duty);
    } else if (limits.maxDutyPerLayer * steps < 1 - 1e-6) {
      if (distance > this.step) this.note("change-below-step", placed, distance);
    } else if (distance > WORTH_SAYING) this.note("change-limited", placed, distance);
  }

  /** Changes that take longer, in whole seconds, than the layer below lasts. The jump over the dead band is exempt. */
  private noteRate(placed: PlacedLayer, duty: number, below: PlacedLayer): void {
    const { limits, leastDuty } = this.channel;
    if (limits.maxDutyPerS === Number.POSITIVE_INFINITY || duty === this.dutyBelow) return;
    const jump = limits.mayBeOff && (duty === 0 || this.dutyBelow === 0) ? leastDuty : 0;
    const change = Math.abs(duty - this.dutyBelow) - jump;
    const neededS = Math.ceil(change / limits.maxDutyPerS - 1e-9);
    if (neededS > below.layer.timeS) this.note("rate-too-slow", placed, neededS);
  }
}
