import type { Motion } from "#shared/formats/machine.ts";
import { deviationForSquareCorner } from "#shared/motion/corner-speed.ts";

/** A machine's motion limits as flat numbers, ready for the planner's inner loop. Absent limits are Infinity. */
export interface MotionRules {
  maxSpeed: number;
  printAccel: number;
  travelAccel: number;
  retractAccel: number;
  /** true when x or y has a limit of its own */
  limitsXY: boolean;
  limitsEveryE: boolean;
  /** true when plain XY moves have limits beyond those along the path */
  limitsEveryMove: boolean;
  maxSpeedX: number;
  maxSpeedY: number;
  maxSpeedZ: number;
  maxSpeedE: number;
  maxAccelX: number;
  maxAccelY: number;
  maxAccelZ: number;
  maxAccelE: number;
  /** 0 square corner, 1 junction deviation, 2 axis jerk */
  cornering: number;
  /** square corner: acceleration × deviation, mm²/s²; junction deviation: deviation, mm */
  cornerFactor: number;
  /** twice the share of the acceleration that the second budget may use: 2(1 − minimum cruise ratio) */
  easyFactor: number;
  /** square of the largest jump of filament speed in a corner, mm²/s² */
  extruderStepSq: number;
  jerk: { x: number; y: number; z: number; e: number };
  stopAtExtrudeOnly: boolean;
  /** blocks the controller sees; Infinity for the whole file */
  lookAhead: number;
}

export function motionRules(motion: Motion): MotionRules {
  const none = Number.POSITIVE_INFINITY;
  const { x, y, z, e } = motion.axes;
  const { cornering } = motion;
  const jerk = cornering.rule === "axis-jerk" ? cornering.jerkMmS : { x: none, y: none, z: none, e: none };
  const square = cornering.rule === "square-corner-velocity" ? cornering : undefined;
  return {
    maxSpeed: motion.maxSpeedMmS,
    printAccel: motion.accelMmS2.print,
    travelAccel: motion.accelMmS2.travel,
    retractAccel: motion.accelMmS2.retract,
    limitsXY: x !== undefined || y !== undefined,
    limitsEveryE: motion.extruderLimits === "every-move",
    limitsEveryMove: x !== undefined || y !== undefined || motion.extruderLimits === "every-move",
    maxSpeedX: x?.maxSpeedMmS ?? none,
    maxSpeedY: y?.maxSpeedMmS ?? none,
    maxSpeedZ: z?.maxSpeedMmS ?? none,
    maxSpeedE: e?.maxSpeedMmS ?? none,
    maxAccelX: x?.maxAccelMmS2 ?? none,
    maxAccelY: y?.maxAccelMmS2 ?? none,
    maxAccelZ: z?.maxAccelMmS2 ?? none,
    maxAccelE: e?.maxAccelMmS2 ?? none,
    cornering: square ? 0 : cornering.rule === "junction-deviation" ? 1 : 2,
    cornerFactor: square
      ? deviationForSquareCorner(square.speedMmS, 1)
      : cornering.rule === "junction-deviation"
        ? cornering.deviationMm
        : 0,
    easyFactor: 2 * (1 - (square?.cruiseRatio ?? 0)),
    extruderStepSq: (square?.extruderStepMmS ?? none) ** 2,
    jerk: { x: jerk.x ?? none, y: jerk.y ?? none, z: jerk.z ?? none, e: jerk.e ?? none },
    stopAtExtrudeOnly: motion.stopAtExtrudeOnly,
    lookAhead: motion.lookAhead === "full" ? none : motion.lookAhead,
  };
}
