import type { Surroundings } from "#shared/thermal/surroundings.ts";

/** One channel: the duty of every layer in print order, commanded `leadS` before the layer begins. */
export interface ChannelDuties {
  id: string;
  leadS: number;
  duty: Float64Array;
}

/**
 * What fans and lamps do to the part while time goes on. An output follows its command with a first-order lag, the air
 * follows the lamps with one of minutes; both are solved exactly, so that a step gets the true mean however long it is.
 *
 * A command changes at once: the staircase with which a slow change is written is not followed. Nothing is commanded
 * before the first layer begins.
 */
export class Forcing {
  /** means over the last step */
  hWM2K = 0;
  topFluxWM2 = 0;
  sideFluxWM2 = 0;
  airRiseC = 0;

  private readonly outputs: Output[];
  private readonly air: { tauS: number; riseC: number; fullWM2: number };
  private readonly h0WM2K: number;
  /** rise of the air as a share of its full rise */
  private airShare = 0;
  private timeS = 0;

  /** @param beginS when each layer begins; the first at 0, s */
  constructor(surroundings: Surroundings, duties: readonly ChannelDuties[], beginS: Float64Array) {
    const { fans, lamps, airLagS, airRiseC, h0WM2K } = surroundings;
    const dutiesOf = (id: string) => duties.find((channel) => channel.id === id);
    this.outputs = [
      ...fans.map(({ id, tauS, h1WM2K, exponent }) => new Output(dutiesOf(id), beginS, tauS, 1, { h1WM2K, exponent })),
      // A filament's lag is that of its light.
      ...lamps.map(({ id, tauS, exponent, absorbedWM2, sideShare }) => {
        const light = { topWM2: absorbedWM2, sideWM2: absorbedWM2 * sideShare };
        return new Output(dutiesOf(id), beginS, tauS, exponent, light);
      }),
    ];
    const fullWM2 = lamps.reduce((sum, { absorbedWM2 }) => sum + absorbedWM2, 0);
    this.air = { tauS: airLagS, riseC: airRiseC, fullWM2 };
    this.h0WM2K = h0WM2K;
  }

  /**
   * Goes on by a step and sets its means.
   *
   * @param dtS > 0
   * @param override what outputs are commanded instead of their duties
   */
  advance(dtS: number, override?: Override): void {
    const untilS = this.timeS + dtS;
    this.hWM2K = this.h0WM2K;
    this.topFluxWM2 = 0;
    this.sideFluxWM2 = 0;
    for (const output of this.outputs) {
      const mean = output.advance(this.timeS, dtS, override);
      const { effect } = output;
      if ("h1WM2K" in effect) {
        if (mean > 0) this.hWM2K += effect.h1WM2K * mean ** effect.exponent;
      } else {
        this.topFluxWM2 += effect.topWM2 * mean;
        this.sideFluxWM2 += effect.sideWM2 * mean;
      }
    }
    this.advanceAir(dtS);
    this.timeS = untilS;
  }

  private advanceAir(dtS: number): void {
    const { tauS, riseC, fullWM2 } = this.air;
    const aim = fullWM2 > 0 ? this.topFluxWM2 / fullWM2 : 0;
    const decay = tauS > 0 ? Math.exp(-dtS / tauS) : 0;
    const mean = aim + ((this.airShare - aim) * tauS * (1 - decay)) / dtS;
    this.airShare = aim + (this.airShare - aim) * decay;
    this.airRiseC = riseC * mean;
  }

  save(): number[] {
    return [this.timeS, this.airShare, ...this.outputs.flatMap(({ value, at }) => [value, at])];
  }

  restore([timeS, airShare, ...values]: readonly number[]): void {
    this.timeS = timeS;
    this.airShare = airShare;
    this.outputs.forEach((output, i) => {
      output.value = values[2 * i];
      output.at = values[2 * i + 1];
    });
  }
}

/** `off`: everything is off. Otherwise lamps stand at their idle duty, by id, and fans go on. */
export type Override = "off" | ReadonlyMap<string, number>;

type Effect = { h1WM2K: number; exponent: number } | { topWM2: number; sideWM2: number };

class Output {
  /** effective value now, and the layer whose command holds; -1: none yet */
  value = 0;
  at = -1;
  readonly effect: Effect;
  private readonly channel: ChannelDuties | undefined;
  private readonly beginS: Float64Array;
  private readonly tauS: number;
  private readonly exponent: number;

  constructor(
    channel: ChannelDuties | undefined,
    beginS: Float64Array,
    tauS: number,
    exponent: number,
    effect: Effect,
  ) {
    this.channel = channel;
    this.beginS = beginS;
    this.tauS = tauS;
    this.exponent = exponent;
    this.effect = effect;
  }

  /** @returns mean effective value over the step */
  advance(fromS: number, dtS: number, override?: Override): number {
    const { channel, beginS, tauS } = this;
    if (channel === undefined) return 0;
    const untilS = fromS + dtS;
    let nowS = fromS;
    let area = 0;
    while (nowS < untilS) {
      const nextS =
        this.at + 1 < beginS.length
          ? Math.max(beginS[0], beginS[this.at + 1] - channel.leadS)
          : Number.POSITIVE_INFINITY;
      if (nextS <= nowS) {
        this.at++;
        continue;
      }
      const pieceS = Math.min(nextS, untilS) - nowS;
      const aim = this.aim(channel, override);
      if (tauS > 0) {
        const decay = Math.exp(-pieceS / tauS);
        area += aim * pieceS + (this.value - aim) * tauS * (1 - decay);
        this.value = aim + (this.value - aim) * decay;
      } else {
        area += aim * pieceS;
        this.value = aim;
      }
      nowS += pieceS;
    }
    return area / dtS;
  }

  private aim({ id, duty }: ChannelDuties, override?: Override): number {
    if (override === "off" || this.at < 0) return 0;
    const wanted = override !== undefined && "topWM2" in this.effect ? (override.get(id) ?? 0) : duty[this.at];
    const within = wanted > 0 ? Math.min(wanted, 1) : 0;
    return this.exponent === 1 ? within : within ** this.exponent;
  }
}
