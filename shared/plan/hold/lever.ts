import type { Machine } from "#shared/formats/machine.ts";
import type { Profile, Rule, Zone } from "#shared/formats/profile.ts";
import { type DutyLimits, effectiveLimits } from "#shared/plan/limits.ts";
import type { Surroundings } from "#shared/thermal/surroundings.ts";

/** A fan's gentle baseline where the rule gives none; common practice, no source. */
export const GENTLE_FAN = 0.2;
/** Length of the lever's part in which fans go from their baseline to their least duty. */
const CALMING = 0.5;

/** One channel that is held in a zone, and how far it may go. Duties 0-1. */
interface HeldChannel {
  id: string;
  /** the least that it may have: 0 where it may be off */
  low: number;
  high: number;
}

interface HeldFan extends HeldChannel {
  /** its gentle baseline, and its least duty other than off */
  base: number;
  least: number;
}

/**
 * All channels that a zone holds, worked as one lever from coldest (0) to warmest (`length`):
 *
 *     fans:   high ──╲______________╱╲
 *                     base        least └──────── off
 *     lamps:  low  ___╱────────────────╲____╱──── high
 *             0      1             2  2.5         length
 *
 * The lamps are the main lever while the fans keep to their gentle baseline; more fan comes only where no lamp is too
 * much still, less only where full lamps are not enough. Between its least duty and off a fan has nothing: where it
 * goes off the lamps go back by what the fan took away, so that the lever stays one that can be worked smoothly. Parts
 * that have no channel are left out.
 */
export class Lever {
  readonly fans: readonly HeldFan[];
  readonly lamps: readonly HeldChannel[];
  readonly length: number;
  /** where fans are at their baseline and lamps at their lowest */
  readonly rest: number;
  private readonly lit: number;
  /** where fans go off, and the share of their range by which lamps go back there */
  private readonly off: number;
  private readonly back: number;

  /** @param warmC a layer temperature at which a fan's least duty is weighed against the lamps, °C */
  constructor(zone: Zone, machine: Machine, profile: Profile, surroundings: Surroundings, warmC: number) {
    this.fans = heldIn(zone.cooling, machine, profile).map(heldFan);
    this.lamps = heldIn(zone.heating, machine, profile).map(heldLamp);
    this.rest = this.fans.length > 0 ? 1 : 0;
    this.lit = this.rest + (this.lamps.length > 0 ? 1 : 0);
    this.off = this.lit + (this.fans.length > 0 ? CALMING : 0);
    this.back = this.fans.length > 0 && this.lamps.length > 0 ? this.lampsBack(surroundings, warmC) : 0;
    this.length = this.off + this.back;
  }

  /** Duties by channel id at a place of the lever. */
  *duties(at: number): Generator<[id: string, duty: number]> {
    const { rest, lit, off, back } = this;
    for (const { id, base, least, high, low } of this.fans) {
      if (at < 1) yield [id, high + (base - high) * at];
      else if (at < off) yield [id, base + (least - base) * (Math.max(at - lit, 0) / CALMING)];
      else yield [id, low];
    }
    const share = at < off ? Math.min(Math.max(at - rest, 0), 1) : 1 - (off + back - at);
    for (const { id, low, high } of this.lamps) yield [id, low + (high - low) * share];
  }

  /** What fans at their least duty take from a warm layer, as a share of what the lamps' range gives it. */
  private lampsBack({ fans, lamps, roomAirC }: Surroundings, warmC: number): number {
    const taken = this.fans.map(({ id, least }) => {
      const { h1WM2K, exponent } = fans.find((fan) => fan.id === id)!;
      return h1WM2K * least ** exponent * Math.max(warmC - roomAirC, 0);
    });
    const given = this.lamps.map(({ id, low, high }) => {
      const { absorbedWM2, exponent } = lamps.find((lamp) => lamp.id === id)!;
      return absorbedWM2 * (high ** exponent - low ** exponent);
    });
    const share = sum(taken) / sum(given);
    return Number.isFinite(share) ? Math.min(share, 1) : 0;
  }
}

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

/** A rule that holds, with the limits of its channel. */
interface HeldRule {
  id: string;
  baseDuty: number | undefined;
  limits: DutyLimits;
}

function heldIn(rules: readonly Rule[], machine: Machine, profile: Profile): HeldRule[] {
  return rules.flatMap((rule) => {
    const channel = machine.channels.find(({ id }) => id === rule.channel);
    if (rule.rule !== "hold" || channel === undefined) return [];
    return [{ id: channel.id, baseDuty: rule.baseDuty, limits: effectiveLimits(channel, profile) }];
  });
}

const within = (duty: number, { minDuty, maxDuty }: DutyLimits): number => Math.min(Math.max(duty, minDuty), maxDuty);

function heldFan({ id, baseDuty = GENTLE_FAN, limits }: HeldRule): HeldFan {
  const base = within(baseDuty, limits);
  return { id, low: 0, least: Math.min(limits.minDuty, base), base, high: limits.maxDuty };
}

/** A lamp's base duty is what it is never turned below while it is held. */
function heldLamp({ id, baseDuty, limits }: HeldRule): HeldChannel {
  const low = baseDuty === undefined && limits.mayBeOff ? 0 : within(baseDuty ?? 0, limits);
  return { id, low, high: limits.maxDuty };
}
