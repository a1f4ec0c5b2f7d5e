import { adviceText } from "#shared/plan/advice-text.ts";
import { inEndRamp } from "#shared/plan/end-ramp.ts";
import { LayerRuns } from "#shared/plan/layer-runs.ts";
import type { PlacedLayer } from "#shared/plan/place-layers.ts";
import type { Advice, AdviceCode } from "#shared/plan/plan.ts";
import type { ReadyChannel } from "#shared/plan/ready-channel.ts";
import { curveInput } from "#shared/plan/rules.ts";

/** How a layer's duty came about, 0-1 each. */
export interface Outcome {
  /** place in print order, from 0 */
  position: number;
  placed: PlacedLayer;
  /** the layer before in print order and its duty; undefined for the first layer */
  below: { layer: PlacedLayer; duty: number } | undefined;
  /** after rule, bed layers and ramps */
  wanted: number;
  /** after lowest, highest and dead band */
  allowed: number;
  /** as planned */
  duty: number;
}

/** A layer this far from its rule is worth a word. */
const WORTH_SAYING = 0.05;

/** Gathers what one channel cannot do for the print, layer by layer, in print order. */
export class ChannelAdvice {
  private readonly noted = new Map<AdviceCode, LayerRuns>();
  private readonly channel: ReadyChannel;
  private readonly step: number;

  constructor(channel: ReadyChannel) {
    this.channel = channel;
    this.step = 1 / channel.steps;
  }

  noteLayer(outcome: Outcome): void {
    if (outcome.placed.rank > this.channel.bedCount) this.noteCurve(outcome);
    this.noteLimits(outcome);
    this.noteChange(outcome);
    if (outcome.below !== undefined) this.noteRate(outcome, outcome.below);
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

  private note(code: AdviceCode, { position, placed }: Outcome, amount: number): void {
    let runs = this.noted.get(code);
    if (runs === undefined) {
      runs = new LayerRuns();
      this.noted.set(code, runs);
    }
    runs.note(position, placed, amount);
  }

  /** Layers outside the points of their curve. */
  private noteCurve(outcome: Outcome): void {
    const { kind, rules, mostDuty } = this.channel;
    const { layer, zone, heightUm } = outcome.placed;
    const rule = rules[zone];
    if (rule.kind !== "curve") return;
    const input = curveInput(rule.over, layer, heightUm);
    if (rule.over === "height") {
      if (input > rule.x[rule.x.length - 1]) this.note("above-curve", outcome, input);
    } else if (rule.over === "layer-time" && !(layer.timeS > 0)) {
      this.note("layer-time-unknown", outcome, input);
    } else if (kind === "fan" && input < rule.x[0]) {
      this.note(outcome.duty >= mostDuty ? "layer-too-short" : "below-curve", outcome, input);
    }
  }

  /** Duties that the channel's lowest and highest keep from what the rule asks for. */
  private noteLimits(outcome: Outcome): void {
    const { kind, limits } = this.channel;
    const { wanted } = outcome;
    if (wanted > limits.maxDuty + this.step) this.note("saturated", outcome, wanted);
    if (kind === "fan" && wanted > 0 && wanted < limits.minDuty) this.note("dead-band", outcome, wanted);
  }

  /** Duties that the largest change from layer to layer keeps behind. */
  private noteChange(outcome: Outcome): void {
    const { limits, steps } = this.channel;
    const { wanted, allowed, duty, placed } = outcome;
    const distance = Math.abs(allowed - duty);
    if (inEndRamp(this.channel, placed)) {
      const goal = limits.mayBeOff ? allowed : wanted;
      if (duty > goal + this.step) this.note("end-ramp-not-held", outcome, duty);
    } else if (limits.maxDutyPerLayer * steps < 1 - 1e-6) {
      if (distance > this.step) this.note("change-below-step", outcome, distance);
    } else if (distance > WORTH_SAYING) this.note("change-limited", outcome, distance);
  }

  /** Changes that take longer, in whole seconds, than the layer below lasts. The jump over the dead band is exempt. */
  private noteRate(outcome: Outcome, below: { layer: PlacedLayer; duty: number }): void {
    const { limits, leastDuty } = this.channel;
    if (limits.maxDutyPerS === Number.POSITIVE_INFINITY || outcome.duty === below.duty) return;
    const jump = limits.mayBeOff && (outcome.duty === 0 || below.duty === 0) ? leastDuty : 0;
    const change = Math.abs(outcome.duty - below.duty) - jump;
    const neededS = Math.ceil(change / limits.maxDutyPerS - 1e-9);
    const { timeS } = below.layer.layer;
    if (neededS > timeS) this.note("rate-too-slow", outcome, neededS);
  }
}
