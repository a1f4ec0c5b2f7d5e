import type { Drive } from "#shared/formats/machine.ts";
import { dutySteps, nearestStep } from "#shared/units/duty.ts";

/**
 * Writing one duty in the machine's own form. Firmwares read the same letters differently, so the form is chosen to be
 * read in one way only:
 *
 * - Off is written as a duty of 0. The separate off command is deprecated in one firmware family.
 * - Fan index 0 is written without P: firmwares with a single fan lack or ignore the word, and the plain form is the one
 *   that all of them take as the part-cooling fan.
 * - Where full power is 1 the value always has a decimal point and never exceeds 1. The firmwares that take 0-1 read a
 *   larger value as 0-255, and those that take 0-255 read 0.6 as a quarter of a per cent.
 * - An S word is always there: without it, some firmwares go to full power.
 */

/** Duties are computed; a rounding error of the last bits is not an error of ours. */
const TOLERANCE = 1e-9;

/**
 * The command that sets an output to a duty, without line terminator.
 *
 * @param drive the channel's output
 * @param duty 0-1, already rounded inward to the drive's resolution (any other duty is written as its nearest step)
 * @throws RangeError for a duty that is not within 0-1: the plan must never ask for it
 */
export function writeDuty(drive: Drive, duty: number): string {
  if (!(duty >= -TOLERANCE && duty <= 1 + TOLERANCE)) throw new RangeError(`duty ${duty} is not within 0-1`);
  const steps = dutySteps(drive);
  const step = Math.min(Math.max(nearestStep(duty, steps), 0), steps);
  switch (drive.by) {
    case "fan-index":
      return `M106${drive.index === 0 ? "" : ` P${drive.index}`} S${registerValue(step, drive.fullScale)}`;
    case "pin":
      return `M42 P${drive.pin} S${registerValue(step, drive.fullScale)}`;
    case "named-fan":
      return `SET_FAN_SPEED FAN=${drive.name} SPEED=${thousandths(step)}`;
    case "named-pin":
      return `SET_PIN PIN=${drive.name} VALUE=${thousandths(step * drive.fullScale)}`;
  }
}

function registerValue(step: number, fullScale: 255 | 1): string {
  if (fullScale === 255) return String(step);
  const value = thousandths(step);
  return value.includes(".") ? value : `${value}.0`;
}

/** A whole number of thousandths in decimals, without trailing zeros; exact, since it never becomes a fraction. */
function thousandths(count: number): string {
  const decimals = String(count % 1000)
    .padStart(3, "0")
    .replace(/0+$/, "");
  const whole = String(Math.floor(count / 1000));
  return decimals === "" ? whole : `${whole}.${decimals}`;
}
