import type { LimitChange } from "#shared/machine/interpreter.ts";
import { deviationForSquareCorner } from "#shared/motion/corner-speed.ts";
import type { MotionRules } from "#shared/motion/motion-rules.ts";

/** Limits that the file sets for itself, never above the machine's own. Rules that the machine's cornering lacks are ignored. */
export function applyLimits(now: MotionRules, machine: MotionRules, change: LimitChange): MotionRules {
  const lower = (given: number | undefined, own: number, current: number): number =>
    given === undefined ? current : Math.min(given, own);
  const { axisSpeed = {}, axisAccel = {}, jerk = {} } = change;
  const square = machine.cornering === 0 && change.squareCorner !== undefined;
  const deviation = machine.cornering === 1 && change.deviation !== undefined;
  const limitsXY = [axisSpeed.x, axisSpeed.y, axisAccel.x, axisAccel.y].some((v) => v !== undefined);
  return {
    ...now,
    maxSpeed: lower(change.maxSpeed, machine.maxSpeed, now.maxSpeed),
    printAccel: lower(change.printAccel, machine.printAccel, now.printAccel),
    travelAccel: lower(change.travelAccel, machine.travelAccel, now.travelAccel),
    retractAccel: lower(change.retractAccel, machine.retractAccel, now.retractAccel),
    limitsXY: now.limitsXY || limitsXY,
    limitsEveryMove: now.limitsEveryMove || limitsXY,
    maxSpeedX: lower(axisSpeed.x, machine.maxSpeedX, now.maxSpeedX),
    maxSpeedY: lower(axisSpeed.y, machine.maxSpeedY, now.maxSpeedY),
    maxSpeedZ: lower(axisSpeed.z, machine.maxSpeedZ, now.maxSpeedZ),
    maxSpeedE: lower(axisSpeed.e, machine.maxSpeedE, now.maxSpeedE),
    maxAccelX: lower(axisAccel.x, machine.maxAccelX, now.maxAccelX),
    maxAccelY: lower(axisAccel.y, machine.maxAccelY, now.maxAccelY),
    maxAccelZ: lower(axisAccel.z, machine.maxAccelZ, now.maxAccelZ),
    maxAccelE: lower(axisAccel.e, machine.maxAccelE, now.maxAccelE),
    cornerFactor: square
      ? lower(deviationForSquareCorner(change.squareCorner!, 1), machine.cornerFactor, now.cornerFactor)
      : deviation
        ? lower(change.deviation, machine.cornerFactor, now.cornerFactor)
        : now.cornerFactor,
    easyFactor:
      change.cruiseRatio === undefined ? now.easyFactor : Math.min(2 * (1 - change.cruiseRatio), machine.easyFactor),
    jerk: {
      x: lower(jerk.x, machine.jerk.x, now.jerk.x),
      y: lower(jerk.y, machine.jerk.y, now.jerk.y),
      z: lower(jerk.z, machine.jerk.z, now.jerk.z),
      e: lower(jerk.e, machine.jerk.e, now.jerk.e),
    },
  };
}
