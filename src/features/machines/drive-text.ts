import type { Channel, Cornering, Drive } from "#shared/formats/machine.ts";

/** The command that sets an output, as it stands in the tuned file. */
export function driveText(drive: Drive): string {
  switch (drive.by) {
    case "fan-index":
      return `M106 P${drive.index}, 0–${drive.fullScale}`;
    case "pin":
      return `M42 P${drive.pin}, 0–${drive.fullScale}`;
    case "named-fan":
      return `SET_FAN_SPEED FAN=${drive.name}, 0–1`;
    case "named-pin":
      return `SET_PIN PIN=${drive.name}, 0–${drive.fullScale}`;
  }
}

export function actsText(acts: Channel["acts"]): string {
  return acts === "queued" ? "in step with motion" : `when read, up to ${acts.immediate} s ahead`;
}

export function corneringText(cornering: Cornering): string {
  switch (cornering.rule) {
    case "square-corner-velocity": {
      const { speedMmS, cruiseRatio, extruderStepMmS } = cornering;
      const step = extruderStepMmS === undefined ? "" : `, extruder step ${extruderStepMmS} mm/s`;
      return `square corner ${speedMmS} mm/s, cruise ratio ${cruiseRatio}${step}`;
    }
    case "junction-deviation":
      return `junction deviation ${cornering.deviationMm} mm`;
    case "axis-jerk": {
      const { x, y, z, e } = cornering.jerkMmS;
      return `jerk X ${x}, Y ${y}, Z ${z}, E ${e} mm/s`;
    }
  }
}
