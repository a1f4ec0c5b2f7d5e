import { mastBracket } from "#samples/generate/mast-bracket.ts";
import { sealRing } from "#samples/generate/seal-ring.ts";
import { sensorCap } from "#samples/generate/sensor-cap.ts";
import { valvePlate } from "#samples/generate/valve-plate.ts";

/** Every toolpath of the demonstration by its file name, with what makes its text. */
export const SAMPLES: Readonly<Record<string, () => string>> = {
  "mast-bracket.gcode": mastBracket,
  "valve-plate.gcode": valvePlate,
  "seal-ring.gcode": sealRing,
  "sensor-cap.gcode": sensorCap,
};
