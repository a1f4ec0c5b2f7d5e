/**
 * Crystallisation in time. At constant temperature (Avrami) the relative crystallinity is X = 1 - exp(-K·t^n); along any
 * temperature history (Nakamura) it is X = 1 - exp(-I^n) with I = ∫ Kn(T) dt and Kn = K^(1/n), so that what a piece of
 * the history adds does not depend on how it is cut. The state is I alone.
 *
 * Avrami: IUPAC Gold Book, A00545. Nakamura K. et al. 1972, J. Appl. Polym. Sci. 16, 1077.
 */

/**
 * @param integral ∫ Kn(T) dt, >= 0
 * @returns share of the attainable crystallinity, 0-1
 */
export function relativeCrystallinity(integral: number, avramiN: number): number {
  return integral <= 0 ? 0 : -Math.expm1(-(integral ** avramiN));
}

/**
 * The integral that belongs to a relative crystallinity; the inverse of `relativeCrystallinity`.
 *
 * @param relative 0-1; 1 itself would take for ever, so it gives the integral of 1 - 2⁻⁵³
 */
export function integralOf(relative: number, avramiN: number): number {
  if (relative <= 0) return 0;
  const left = Math.max(-relative, -1 + 2 ** -53);
  return (-Math.log1p(left)) ** (1 / avramiN);
}

/**
 * Time to half of the attainable crystallinity at constant temperature, s.
 *
 * @param ratePerS Kn, > 0
 */
export function halfTimeS(ratePerS: number, avramiN: number): number {
  return Math.LN2 ** (1 / avramiN) / ratePerS;
}

const CELLS = 4096;

/** `relativeCrystallinity` from a table, to within 2e-5 for exponents from 1 to 6: asked for at every step of every node. */
export class GrowthTable {
  private readonly perIntegral: number;
  private readonly relative: Float64Array;

  constructor(avramiN: number) {
    // Beyond this the rest is below what a number can tell from 1.
    const highest = 37 ** (1 / avramiN);
    this.perIntegral = CELLS / highest;
    this.relative = Float64Array.from({ length: CELLS + 1 }, (_, cell) =>
      relativeCrystallinity((cell * highest) / CELLS, avramiN),
    );
    this.relative[CELLS] = 1;
  }

  /** @param integral >= 0 */
  at(integral: number): number {
    const place = integral * this.perIntegral;
    if (!(place < CELLS)) return 1;
    const cell = Math.floor(place);
    const low = this.relative[cell];
    return low + (this.relative[cell + 1] - low) * (place - cell);
  }
}
