import type { Channel } from "#shared/formats/machine.ts";
import type { OwnTag } from "#shared/gcode/own-lines.ts";
import type { Boundary } from "#shared/layers/reading.ts";
import type { DutyLimits } from "#shared/plan/limits.ts";
import { dutySteps, roundDutyInward } from "#shared/units/duty.ts";

/** Two duties closer than this are the same; a drive's step is far larger. */
export const SAME = 1e-6;

/** One command of ours: a duty written at a line boundary. */
export interface Write extends Boundary {
  duty: number;
  tag: OwnTag;
}

/** A duty that is wanted from a boundary on. */
export interface Target {
  /** position in the list of boundaries */
  at: number;
  duty: number;
}

/** The highest duty within the limits that the channel's drive can express. */
export const highestDuty = ({ drive }: Channel, { maxDuty }: DutyLimits): number =>
  roundDutyInward(maxDuty, dutySteps(drive), 0, maxDuty);
