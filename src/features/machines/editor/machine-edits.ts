import type { Channel, Cornering, Drive, Machine, Motion } from "#shared/formats/machine.ts";
import { withThermalOf } from "#src/features/machines/thermal-fields.ts";

/** Changes of a machine document. Each returns a new machine. */

export function withMotion(machine: Machine, changes: Partial<Motion>): Machine {
  return { ...machine, motion: { ...machine.motion, ...changes } };
}

type Axis = "x" | "y" | "z" | "e";

/** An axis without any limit is left out of the document. */
export function withAxisLimit(
  machine: Machine,
  axis: Axis,
  field: "maxSpeedMmS" | "maxAccelMmS2",
  value: number | undefined,
): Machine {
  const { [axis]: limits = {}, ...others } = machine.motion.axes;
  const { [field]: _, ...rest } = limits;
  const next = value === undefined ? rest : { ...rest, [field]: value };
  return withMotion(machine, { axes: Object.keys(next).length === 0 ? others : { ...others, [axis]: next } });
}

/** The same corners under another rule, with values to begin from. */
export function corneringOf(rule: Cornering["rule"]): Cornering {
  switch (rule) {
    case "square-corner-velocity":
      return { rule, speedMmS: 5, cruiseRatio: 0.5 };
    case "junction-deviation":
      return { rule, deviationMm: 0.013 };
    case "axis-jerk":
      return { rule, jerkMmS: { x: 9, y: 9, z: 0.5, e: 4 } };
  }
}

export function withChannel(machine: Machine, c: number, changes: Partial<Channel>): Machine {
  return {
    ...(changes.id === undefined ? machine : withThermalOf(machine, machine.channels[c].id, changes.id)),
    channels: machine.channels.map((channel, i) => (i === c ? { ...channel, ...changes } : channel)),
  };
}

export function withoutChannel(machine: Machine, c: number): Machine {
  const rest = withThermalOf(machine, machine.channels[c].id, undefined);
  return { ...rest, channels: machine.channels.filter((_, i) => i !== c) };
}

/** A new fan or heater on an output that no other channel has. */
export function channelAdded(machine: Machine, kind: Channel["kind"]): Machine {
  const taken = new Set(machine.channels.map(({ id }) => id));
  const stem = kind === "fan" ? "part-fan" : "lamp";
  const id = firstFree((n) => (n === 1 ? stem : `${stem}-${n}`), taken);
  const indexes = new Set(machine.channels.flatMap(({ drive }) => (drive.by === "fan-index" ? [drive.index] : [])));
  const drive: Drive = { by: "fan-index", index: firstFree((n) => n - 1, indexes), fullScale: 255 };
  const channel: Channel = {
    id,
    kind,
    drive,
    minDuty: 0,
    maxDuty: 1,
    idleDuty: 0,
    startBoostS: 0,
    settleS: 0,
    acts: "queued",
  };
  return { ...machine, channels: [...machine.channels, channel] };
}

function firstFree<Value>(candidate: (n: number) => Value, taken: ReadonlySet<Value>): Value {
  for (let n = 1; ; n++) if (!taken.has(candidate(n))) return candidate(n);
}

/** The same output driven by another command; what both have stays. */
export function driveBy(drive: Drive, by: Drive["by"]): Drive {
  const fullScale = "fullScale" in drive && drive.fullScale === 1 ? 1 : 255;
  const name = "name" in drive ? drive.name : "";
  switch (by) {
    case "fan-index":
      return { by, index: "pin" in drive ? drive.pin : 0, fullScale };
    case "pin":
      return { by, pin: "index" in drive ? drive.index : 0, fullScale };
    case "named-fan":
      return { by, name };
    case "named-pin":
      return { by, name, fullScale: "fullScale" in drive ? drive.fullScale : 1 };
  }
}

/** A kind whose own fields the other does not have: they go back to their defaults. */
export function asKind(channel: Channel, kind: Channel["kind"]): Channel {
  return kind === "fan" ? { ...channel, kind, idleDuty: 0 } : { ...channel, kind, startBoostS: 0 };
}

/** A document to begin from: a cautious machine with one fan and one lamp. */
export function newMachine(): Machine {
  const empty: Machine = {
    format: "quenchline.machine/1",
    name: "",
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      axes: {},
      extruderLimits: "extrude-only",
      cornering: corneringOf("square-corner-velocity"),
      stopAtExtrudeOnly: true,
      arcSegmentMm: 1,
      firmwareRetract: { lengthMm: 0, speedMmS: 20 },
      initialSpeedMmS: 25,
      lookAhead: "full",
      honourFileLimits: false,
      dwellP: "ms",
      axisModeSetsExtruder: false,
      filamentDiameterMm: 1.75,
    },
    channels: [],
    pauses: [{ command: "M0", blocking: true }],
  };
  return channelAdded(channelAdded(empty, "fan"), "heater");
}
