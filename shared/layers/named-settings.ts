import type { LimitChange } from "#shared/machine/interpreter.ts";

const number = (text: string | undefined): number | undefined => {
  const value = Number(text);
  return text !== undefined && Number.isFinite(value) && value > 0 ? value : undefined;
};

/** `SET_VELOCITY_LIMIT VELOCITY= ACCEL= SQUARE_CORNER_VELOCITY= MINIMUM_CRUISE_RATIO=`; undefined for other names. */
export function namedLimits(name: string, parameters: Map<string, string>): LimitChange | undefined {
  if (name !== "SET_VELOCITY_LIMIT") return undefined;
  const accel = number(parameters.get("ACCEL"));
  const toDecel = number(parameters.get("ACCEL_TO_DECEL"));
  const ratio = parameters.get("MINIMUM_CRUISE_RATIO");
  const cruiseRatio =
    ratio !== undefined
      ? Number(ratio)
      : toDecel !== undefined && accel !== undefined
        ? 1 - Math.min(1, toDecel / accel)
        : undefined;
  return {
    maxSpeed: number(parameters.get("VELOCITY")),
    printAccel: accel,
    travelAccel: accel,
    squareCorner: number(parameters.get("SQUARE_CORNER_VELOCITY")),
    cruiseRatio: cruiseRatio !== undefined && cruiseRatio >= 0 && cruiseRatio < 1 ? cruiseRatio : undefined,
  };
}

const NOZZLE_KEY = /^(EXTRUDER|NOZZLE|HOTEND|TOOL)(_?TEMP(ERATURE)?)?$/;
const BED_KEY = /^BED(_?TEMP(ERATURE)?)?$/;

/** Set-points in a macro's arguments, as start macros carry them (common practice, no source), °C. */
export function namedTemperatures(name: string, parameters: Map<string, string>): { nozzleC?: number; bedC?: number } {
  if (name === "SET_HEATER_TEMPERATURE") {
    const target = number(parameters.get("TARGET"));
    const heater = parameters.get("HEATER")?.toLowerCase() ?? "";
    if (heater.startsWith("extruder")) return { nozzleC: target };
    return heater === "heater_bed" ? { bedC: target } : {};
  }
  const found: { nozzleC?: number; bedC?: number } = {};
  for (const [key, value] of parameters) {
    if (NOZZLE_KEY.test(key)) found.nozzleC ??= number(value);
    else if (BED_KEY.test(key)) found.bedC ??= number(value);
  }
  return found;
}
