/**
 * How fast a corner between two moves may be taken. Three rules, chosen on the machine. All return squared speeds.
 *
 * Common to the first two: the circle that touches both moves and passes the corner at a stated distance.
 * With theta the angle between the moves (180° straight on), cos theta = -u1·u2,
 *
 *     v² = a · d · sin(theta/2) / (1 - sin(theta/2))
 *
 * S. Jeon 2011, "Improving Grbl: cornering algorithm"; check values T5 and T6 of the reference sheet.
 */

/** Deviation of the circle that gives the wanted speed in a right-angled corner: v²(√2 − 1)/a, mm. */
export const deviationForSquareCorner = (speedMmS: number, accelMmS2: number): number =>
  (speedMmS * speedMmS * (Math.SQRT2 - 1)) / accelMmS2;

/**
 * Junction deviation.
 *
 * @param accelMmS2 acceleration available through the corner, mm/s²
 * @param deviationMm distance of the rounding circle from the corner, mm
 * @param dot u1·u2 of the unit directions, -1 reversal … 1 straight on
 * @returns largest squared speed, mm²/s²; Infinity straight on, 0 at a reversal
 */
export function junctionSpeedSq(accelMmS2: number, deviationMm: number, dot: number): number {
  const sinHalf = Math.sqrt(Math.max(0.5 * (1 + dot), 0));
  return sinHalf >= 1 ? Number.POSITIVE_INFINITY : (accelMmS2 * deviationMm * sinHalf) / (1 - sinHalf);
}

/** The rounding circle may touch a move no further than its middle: v² ≤ a·L·tan(theta/2)/2. */
export function midMoveSpeedSq(accelMmS2: number, lengthMm: number, dot: number): number {
  const cosHalf = Math.sqrt(Math.max(0.5 * (1 - dot), 0));
  if (cosHalf === 0) return Number.POSITIVE_INFINITY;
  return (0.5 * accelMmS2 * lengthMm * Math.sqrt(Math.max(0.5 * (1 + dot), 0))) / cosHalf;
}
