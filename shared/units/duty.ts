/**
 * Duties are 0-1 everywhere inside; an output knows only so many steps of them. Whether a register runs to 255 or to 1,
 * and why mixing them up is dangerous: see the notes of write-command.ts.
 */

/** What the resolution of an output depends on; a channel's drive is one. */
export interface DutyScale {
  by: "fan-index" | "pin" | "named-fan" | "named-pin";
  fullScale?: number;
}

/** Number of steps from off to full power that a written command can express: 255, or 1000 where decimals are written. */
export function dutySteps({ by, fullScale }: DutyScale): 255 | 1000 {
  return (by === "fan-index" || by === "pin") && fullScale === 255 ? 255 : 1000;
}

/** Decimal limits such as 0.85 are not exact in binary; a step this close to a limit counts as on it. */
const TOLERANCE = 1e-9;

/**
 * The step nearest to a duty that lies within [lo, hi]; halves go up. Where no step lies within, the highest one that
 * does not exceed hi: too little power is the safe side.
 *
 * @param duty 0-1
 * @param steps steps from off to full power, see dutySteps
 * @param lo lowest duty allowed, 0-1
 * @param hi highest duty allowed, 0-1, >= lo
 * @returns duty, a whole number of steps divided by `steps`
 */
export function roundDutyInward(duty: number, steps: number, lo: number, hi: number): number {
  const lowest = Math.ceil((lo - TOLERANCE) * steps);
  const highest = Math.min(steps, Math.floor((hi + TOLERANCE) * steps));
  return Math.min(Math.max(nearestStep(duty, steps), lowest, 0), highest) / steps;
}

/** The whole number of steps nearest to a duty; halves go up, as S values are commonly rounded. */
export function nearestStep(duty: number, steps: number): number {
  return Math.round((duty + TOLERANCE) * steps);
}

/** Duty 0-1 to the S value of a 0-255 register, nearest, halves up. */
export function dutyToS(duty: number): number {
  return nearestStep(duty, 255);
}

/** S value of a 0-255 register to duty; values above 255 are full power. */
export function sToDuty(s: number): number {
  return Math.min(Math.max(s, 0), 255) / 255;
}
