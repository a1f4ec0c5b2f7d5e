import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { Assumed } from "#shared/formats/prediction.ts";
import { type Quantity, type Range, rangeOf } from "#shared/formats/thermal.ts";
import type { Material } from "#shared/polymers/material.ts";
import { TYPICAL, type TypicalRange } from "#shared/thermal/typical-ranges.ts";

/** Which end of every uncertain input is taken: together at one end they are the worst case, not a likely one. */
export type End = "typical" | "hot" | "cold";

/** All that surrounds a part, as plain numbers at one end of their ranges. */
export interface Surroundings {
  roomAirC: number;
  /** what the part radiates to; null: it is as warm as the air */
  wallsC: number | null;
  bedAirRiseC: number;
  bedAirDecayMm: number;
  h0WM2K: number;
  fans: Fan[];
  lamps: Lamp[];
  /** rise of the air with all lamps at full, and its first-order lag */
  airRiseC: number;
  airLagS: number;
  bedContactM2KW: number;
}

export interface Fan {
  id: string;
  h1WM2K: number;
  exponent: number;
  /** first-order lag, s */
  tauS: number;
}

export interface Lamp {
  id: string;
  /** absorbed by the top at full duty, W/m² */
  absorbedWM2: number;
  sideShare: number;
  exponent: number;
  tauS: number;
}

/** First-order lag of an output that reaches 90 % of a change in `settleS`. */
const LN_10 = Math.log(10);

/**
 * What surrounds a part on a machine, for one polymer.
 *
 * Hot are: warm air, weak convection, a strong lamp, much of its light absorbed, a good contact with the bed. The lamp's
 * lag has no hot end and is taken as typical.
 */
export function surroundingsOf(machine: Machine, { lampAbsorptivity }: Material, end: End): Surroundings {
  const { thermal = {} } = machine;
  const warm = (given: Quantity | undefined, typical: Range) => pick(given ?? typical, end);
  const weak = (given: Quantity | undefined, typical: Range) => pick(given ?? typical, opposite(end));
  const lampLag = ({ id, settleS }: Channel) => {
    const given = thermal.lamps?.[id]?.lagS;
    if (given !== undefined) return rangeOf(given).typical;
    return settleS > 0 ? settleS / LN_10 : TYPICAL.lampLagS.typical;
  };
  const fan = ({ id, settleS }: Channel): Fan => {
    const given = thermal.convection?.fans?.[id];
    return {
      id,
      h1WM2K: weak(given?.h1WM2K, TYPICAL.h1WM2K),
      // A duty is at most 1, so the larger exponent cools less.
      exponent: warm(given?.exponent, TYPICAL.fanExponent),
      tauS: settleS / LN_10,
    };
  };
  const lamp = (channel: Channel): Lamp => {
    const given = thermal.lamps?.[channel.id];
    const flux = given?.fluxAtFullWM2;
    return {
      id: channel.id,
      absorbedWM2: flux === undefined ? pick(TYPICAL.absorbedWM2, end) : pick(flux, end) * pick(lampAbsorptivity, end),
      sideShare: warm(given?.sideShare, TYPICAL.sideShare),
      exponent: weak(given?.exponent, TYPICAL.lampExponent),
      tauS: lampLag(channel),
    };
  };
  const lamps = machine.channels.filter(({ kind }) => kind === "heater").map(lamp);
  return {
    roomAirC: warm(thermal.roomAirC, TYPICAL.roomAirC),
    wallsC: thermal.wallsC === undefined ? null : pick(thermal.wallsC, end),
    bedAirRiseC: warm(thermal.bedAir?.riseC, TYPICAL.bedAirRiseC),
    bedAirDecayMm: warm(thermal.bedAir?.decayMm, TYPICAL.bedAirDecayMm),
    h0WM2K: weak(thermal.convection?.h0WM2K, TYPICAL.h0WM2K),
    fans: machine.channels.filter(({ kind }) => kind === "fan").map(fan),
    lamps,
    airRiseC: lamps.length === 0 ? 0 : warm(thermal.surroundings?.riseAtFullLampC, TYPICAL.airRiseC),
    airLagS: weak(thermal.surroundings?.lagS, TYPICAL.airLagS),
    bedContactM2KW: weak(thermal.bedContactM2KW, TYPICAL.bedContactM2KW),
  };
}

function pick(quantity: Quantity, end: End): number {
  const { low, typical, high } = rangeOf(quantity);
  return end === "typical" ? typical : end === "hot" ? high : low;
}

function opposite(end: End): End {
  return end === "typical" ? end : end === "hot" ? "cold" : "hot";
}

/** What the machine document leaves out, so that a typical range stands in for it; paths are those of the document. */
export function assumedValues({ thermal = {}, channels }: Machine): Assumed[] {
  const { bedAir, convection, lamps = {}, surroundings } = thermal;
  const assumed: Assumed[] = [];
  const check = (path: string, given: Quantity | undefined, { low, typical, high, source }: TypicalRange) => {
    if (given === undefined) assumed.push({ path: `thermal.${path}`, low, typical, high, source });
  };
  const hasLamp = channels.some(({ kind }) => kind === "heater");
  check("roomAirC", thermal.roomAirC, TYPICAL.roomAirC);
  check("bedAir.riseC", bedAir?.riseC, TYPICAL.bedAirRiseC);
  check("bedAir.decayMm", bedAir?.decayMm, TYPICAL.bedAirDecayMm);
  check("convection.h0WM2K", convection?.h0WM2K, TYPICAL.h0WM2K);
  for (const { id, kind, settleS } of channels) {
    if (kind === "fan") {
      const fan = convection?.fans?.[id];
      check(`convection.fans.${id}.h1WM2K`, fan?.h1WM2K, TYPICAL.h1WM2K);
      check(`convection.fans.${id}.exponent`, fan?.exponent, TYPICAL.fanExponent);
    } else {
      const lamp = lamps[id];
      check(`lamps.${id}.fluxAtFullWM2`, lamp?.fluxAtFullWM2, TYPICAL.absorbedWM2);
      check(`lamps.${id}.sideShare`, lamp?.sideShare, TYPICAL.sideShare);
      check(`lamps.${id}.exponent`, lamp?.exponent, TYPICAL.lampExponent);
      if (settleS === 0) check(`lamps.${id}.lagS`, lamp?.lagS, TYPICAL.lampLagS);
    }
  }
  if (hasLamp) {
    check("surroundings.riseAtFullLampC", surroundings?.riseAtFullLampC, TYPICAL.airRiseC);
    check("surroundings.lagS", surroundings?.lagS, TYPICAL.airLagS);
  }
  check("bedContactM2KW", thermal.bedContactM2KW, TYPICAL.bedContactM2KW);
  return assumed;
}
