import type { Kinetics } from "#shared/polymers/material.ts";

/**
 * Rate constant Kn of crystallisation at a temperature, 1/s: a bell over temperature, zero at and below Tg and at and
 * above Tm. The half-width approximation of A. Ziabicki, Kmax · exp(-4 ln 2 · (T - Tmax)² / D²); his D is the full width
 * at half height, the card's number half of it.
 */
export function ratePerS(kinetics: Kinetics, tempC: number): number {
  return tempC > kinetics.tgC && tempC < kinetics.tmC ? bell(kinetics, tempC) : 0;
}

/** The bell without its ends cut off, 1/s. */
function bell({ fastestPerS, fastestAtC, halfWidthC }: Kinetics, tempC: number): number {
  return fastestPerS * Math.exp(-Math.LN2 * ((tempC - fastestAtC) / halfWidthC) ** 2);
}

const CELL_C = 0.25;
/** Below this change of temperature the rate is read in the middle: a difference quotient would only lose digits. */
const LEAST_CHANGE_C = 0.05;

/**
 * The rate constant and its mean over a change of temperature, from tables: they are asked for at every step of every
 * node. Between entries 0.25 K apart the rate runs straight, and its mean is exact for that.
 */
export class RateTable {
  private readonly lowC: number;
  private readonly highC: number;
  /** at the cells' ends: rate, 1/s, and its integral over temperature from Tg, K/s */
  private readonly rate: Float64Array;
  private readonly primitive: Float64Array;

  constructor(kinetics: Kinetics) {
    this.lowC = kinetics.tgC;
    this.highC = kinetics.tmC;
    const cells = Math.ceil((this.highC - this.lowC) / CELL_C);
    this.rate = Float64Array.from({ length: cells + 1 }, (_, cell) => bell(kinetics, this.lowC + cell * CELL_C));
    this.primitive = new Float64Array(cells + 1);
    for (let cell = 0; cell < cells; cell++)
      this.primitive[cell + 1] = this.primitive[cell] + ((this.rate[cell] + this.rate[cell + 1]) / 2) * CELL_C;
  }

  /** 1/s */
  at(tempC: number): number {
    if (!(tempC > this.lowC && tempC < this.highC)) return 0;
    const place = (tempC - this.lowC) / CELL_C;
    const cell = Math.floor(place);
    return this.rate[cell] + (this.rate[cell + 1] - this.rate[cell]) * (place - cell);
  }

  /** Mean over a temperature that runs evenly from one value to another, 1/s. */
  mean(fromC: number, toC: number): number {
    if (fromC <= this.lowC && toC <= this.lowC) return 0;
    const change = toC - fromC;
    if (Math.abs(change) < LEAST_CHANGE_C) return this.at((fromC + toC) / 2);
    return (this.integral(toC) - this.integral(fromC)) / change;
  }

  private integral(tempC: number): number {
    if (tempC <= this.lowC) return 0;
    const cutC = Math.min(tempC, this.highC) - this.lowC;
    const cell = Math.min(Math.floor(cutC / CELL_C), this.rate.length - 2);
    const withinC = cutC - cell * CELL_C;
    const slope = (this.rate[cell + 1] - this.rate[cell]) / CELL_C;
    return this.primitive[cell] + withinC * (this.rate[cell] + (slope * withinC) / 2);
  }
}

/**
 * ∫ Kn(T) dt along a measured or computed history, which runs evenly between its points.
 *
 * @param timesS rising
 * @param tempsC one for each time
 */
export function rateIntegral(kinetics: Kinetics, timesS: ArrayLike<number>, tempsC: ArrayLike<number>): number {
  const table = new RateTable(kinetics);
  let integral = 0;
  for (let i = 1; i < timesS.length; i++)
    integral += (timesS[i] - timesS[i - 1]) * table.mean(tempsC[i - 1], tempsC[i]);
  return integral;
}
