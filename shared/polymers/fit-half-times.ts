import { Refusal } from "#shared/refusal.ts";

/** The bell K(T) = fastest · exp(-ln 2 · ((T - fastestAt) / halfWidth)²). */
export interface Bell {
  fastestPerS: number;
  fastestAtC: number;
  halfWidthC: number;
}

/**
 * The bell that runs closest to isothermal half-times. Each half-time gives a rate constant, K = (ln 2)^(1/n) / t½; the
 * logarithm of a bell is a parabola, so least squares over ln K need no starting values and no iteration.
 *
 * @param points [°C, s], at least three different temperatures
 * @param avramiN exponent that belongs to the half-times
 * @throws Refusal `half-times-unusable` where the points show no fastest temperature between Tg and Tm
 */
export function fitHalfTimes(
  points: readonly (readonly [tempC: number, halfTimeS: number])[],
  avramiN: number,
  { tgC, tmC }: { tgC: number; tmC: number },
): Bell {
  // Centred and scaled: the normal equations of raw temperatures lose digits.
  const meanC = points.reduce((sum, [tempC]) => sum + tempC, 0) / points.length;
  const spanC = Math.max(...points.map(([tempC]) => Math.abs(tempC - meanC)));
  const sums = [0, 0, 0, 0, 0];
  const rights = [0, 0, 0];
  for (const [tempC, halfTimeS] of points) {
    const x = (tempC - meanC) / spanC;
    const y = Math.log(Math.LN2) / avramiN - Math.log(halfTimeS);
    for (let power = 0, xPower = 1; power < 5; power++, xPower *= x) {
      sums[power] += xPower;
      if (power < 3) rights[power] += xPower * y;
    }
  }
  const [c0, c1, c2] = solve3(sums, rights);
  const fastestAtC = meanC - (spanC * c1) / (2 * c2);
  if (!(c2 < 0) || !(fastestAtC > tgC && fastestAtC < tmC)) refuse(tgC, tmC);
  return {
    fastestPerS: Math.exp(c0 - c1 ** 2 / (4 * c2)),
    fastestAtC,
    halfWidthC: spanC * Math.sqrt(-Math.LN2 / c2),
  };
}

function refuse(tgC: number, tmC: number): never {
  throw new Refusal(
    "half-times-unusable",
    `The half-times on the polymer's card show no temperature between Tg ${tgC} °C and Tm ${tmC} °C at which it crystallises fastest.`,
    "Add half-times on both sides of the fastest temperature, or leave halfTimes out.",
    { path: "crystallinity.halfTimes" },
  );
}

/** Solves the normal equations of a parabola; entry (r, c) of the matrix is sums[r + c]. */
function solve3(sums: readonly number[], rights: readonly number[]): [number, number, number] {
  const column = (replaced: number) => (row: number, col: number) => (col === replaced ? rights[row] : sums[row + col]);
  const determinant = (at: (row: number, col: number) => number) =>
    at(0, 0) * (at(1, 1) * at(2, 2) - at(1, 2) * at(2, 1)) -
    at(0, 1) * (at(1, 0) * at(2, 2) - at(1, 2) * at(2, 0)) +
    at(0, 2) * (at(1, 0) * at(2, 1) - at(1, 1) * at(2, 0));
  const whole = determinant((row, col) => sums[row + col]);
  return [determinant(column(0)) / whole, determinant(column(1)) / whole, determinant(column(2)) / whole];
}
