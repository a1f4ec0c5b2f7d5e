import { junctionSpeedSq } from "#shared/motion/corner-speed.ts";
import type { MotionRules } from "#shared/motion/motion-rules.ts";

/**
 * Narrows speed and acceleration along a move to the limits of the axes it uses, each scaled by its share of the move.
 *
 * @param out takes the speed, mm/s, and the acceleration, mm/s²
 */
export function limitByAxes(
  rules: MotionRules,
  dx: number,
  dy: number,
  dz: number,
  de: number,
  lengthMm: number,
  speedMmS: number,
  accelMmS2: number,
  out: Float64Array,
): void {
  out[0] = speedMmS;
  out[1] = accelMmS2;
  narrow(dz, lengthMm, rules.maxSpeedZ, rules.maxAccelZ, out);
  if (rules.limitsXY) {
    narrow(dx, lengthMm, rules.maxSpeedX, rules.maxAccelX, out);
    narrow(dy, lengthMm, rules.maxSpeedY, rules.maxAccelY, out);
  }
  if (de < 0 || (de > 0 && (rules.limitsEveryE || (dx === 0 && dy === 0))))
    narrow(de, lengthMm, rules.maxSpeedE, rules.maxAccelE, out);
}

function narrow(part: number, lengthMm: number, maxSpeed: number, maxAccel: number, out: Float64Array): void {
  const share = Math.abs(part) / lengthMm;
  if (maxSpeed < out[0] * share) out[0] = maxSpeed / share;
  if (maxAccel < out[1] * share) out[1] = maxAccel / share;
}

/** An arc cut into chords shorter than this is recognised as one. */
const SHORT_MM = 1;
/** smallest angle between chords that the arc rule divides by, rad */
const MIN_TURN = 0.033;

/**
 * Junction deviation with the acceleration limited per axis along the change of direction. Short chords at an obtuse
 * angle are taken as an arc of radius length/angle: v² = a·r.
 *
 * @param change difference of the unit directions, x y z
 * @param dot u1·u2
 */
export function deviationCornerSq(
  rules: MotionRules,
  change: number[],
  dot: number,
  accelMmS2: number,
  lengthMm: number,
): number {
  if (dot > 0.999999) return Number.POSITIVE_INFINITY;
  if (dot < -0.999999) return 0;
  const norm = Math.hypot(...change);
  const [x, y, z] = change.map((part) => Math.abs(part) / norm);
  let a = accelMmS2;
  if (rules.maxAccelX < a * x) a = rules.maxAccelX / x;
  if (rules.maxAccelY < a * y) a = rules.maxAccelY / y;
  if (rules.maxAccelZ < a * z) a = rules.maxAccelZ / z;
  const bound = junctionSpeedSq(a, rules.cornerFactor, dot);
  if (lengthMm >= SHORT_MM || dot <= Math.SQRT1_2) return bound;
  return Math.min(bound, (lengthMm * a) / Math.max(Math.acos(dot), MIN_TURN));
}

/**
 * Per-axis jerk: both directions at one common speed; no axis may jump by more than its own jerk.
 *
 * @param change difference of the unit directions, x y z e
 */
export function jerkCornerSq({ jerk }: MotionRules, change: number[], commonSpeedSq: number): number {
  const v = Math.sqrt(commonSpeedSq);
  const allowed = [jerk.x, jerk.y, jerk.z, jerk.e];
  let factor = 1;
  for (let axis = 0; axis < 4; axis++) {
    const jump = Math.abs(change[axis]) * v;
    if (jump > allowed[axis]) factor = Math.min(factor, allowed[axis] / jump);
  }
  return commonSpeedSq * factor * factor;
}

/** After standstill a move may start at the speed whose axis components equal the jerk. */
export function startFromRestSq({ jerk }: MotionRules, direction: number[], cruiseSpeedSq: number): number {
  const allowed = [jerk.x, jerk.y, jerk.z, jerk.e];
  let v = Math.sqrt(cruiseSpeedSq);
  for (let axis = 0; axis < 4; axis++) {
    const part = Math.abs(direction[axis]);
    if (part * v > allowed[axis]) v = allowed[axis] / part;
  }
  return v * v;
}
