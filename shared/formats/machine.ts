import { z } from "zod";
import { parseDocument, writeDocument } from "#shared/formats/document.ts";
import {
  ChannelId,
  DriveName,
  Duty,
  DutyAboveZero,
  fields,
  Label,
  numberWithin,
  positiveUpTo,
  Version,
  wholeWithin,
} from "#shared/formats/fields.ts";
import { checkChannel, checkChannels, checkPauses, checkThermal } from "#shared/formats/machine-checks.ts";
import { Thermal } from "#shared/formats/thermal.ts";

/** Bounds that catch a slipped decimal point or unit, not the limits of any one machine. */
const SpeedMmS = positiveUpTo(5_000);
const AccelMmS2 = positiveUpTo(1_000_000);
/** A speed at a corner may be 0: every corner is then a full stop. */
const CornerSpeedMmS = numberWithin(0, 5_000);
const FullScale = z.literal([255, 1]);

/** The command that sets an output, and the number that stands for full power in it. */
export const Drive = z.discriminatedUnion("by", [
  /** M106/M107 with P; index 0 also matches a command without P */
  fields({ by: z.literal("fan-index"), index: wholeWithin(0, 99), fullScale: FullScale }),
  /** M42 P S */
  fields({ by: z.literal("pin"), pin: wholeWithin(0, 999), fullScale: FullScale }),
  /** SET_FAN_SPEED FAN= SPEED=, 0-1 */
  fields({ by: z.literal("named-fan"), name: DriveName }),
  /** SET_PIN PIN= VALUE=, 0-fullScale; whole numbers only, so that three decimals always express a duty step */
  fields({ by: z.literal("named-pin"), name: DriveName, fullScale: wholeWithin(1, 65_535).default(1) }),
]);
export type Drive = z.infer<typeof Drive>;

/** One PWM output of the machine: a fan or a radiant heater. Duties 0-1, times in seconds. */
export const Channel = fields({
  id: ChannelId,
  kind: z.enum(["fan", "heater"]),
  drive: Drive,
  /** below this a fan stalls: the plan writes 0 or at least this (default 0: no dead band) */
  minDuty: Duty.default(0),
  maxDuty: DutyAboveZero.default(1),
  /** duty a heater falls back to at pauses and at the end of the step-down (default 0: off) */
  idleDuty: Duty.default(0),
  /** full power for this long when a fan starts from standstill (default 0: none), s */
  startBoostS: numberWithin(0, 10).default(0),
  /** time to 90 % of a change (default 0: at once), s */
  settleS: numberWithin(0, 600).default(0),
  /** largest change of duty per second; left out: no limit */
  maxDutyPerS: positiveUpTo(1_000).optional(),
  /** in step with motion, or when the line is read, up to `immediate` seconds ahead of the motion */
  acts: z
    .union([z.literal("queued"), fields({ immediate: numberWithin(0, 60) })], {
      error: 'must be "queued" or { "immediate": seconds from 0 to 60 }',
    })
    .default("queued"),
}).superRefine(checkChannel);
export type Channel = z.infer<typeof Channel>;

/** How fast a corner between two moves may be taken. */
export const Cornering = z.discriminatedUnion("rule", [
  fields({
    rule: z.literal("square-corner-velocity"),
    speedMmS: CornerSpeedMmS,
    /** least share of a move that is cruised (default 0: no such limit) */
    cruiseRatio: numberWithin(0, 0.999).default(0),
    /** largest step of the extruder's speed at a corner; left out: no such limit, mm/s */
    extruderStepMmS: positiveUpTo(5_000).optional(),
  }),
  fields({ rule: z.literal("junction-deviation"), deviationMm: numberWithin(0, 10) }),
  fields({
    rule: z.literal("axis-jerk"),
    jerkMmS: fields({ x: CornerSpeedMmS, y: CornerSpeedMmS, z: CornerSpeedMmS, e: CornerSpeedMmS }),
  }),
]);
export type Cornering = z.infer<typeof Cornering>;

/** Limits of one axis; a value left out is no limit. */
const AxisLimits = fields({ maxSpeedMmS: SpeedMmS.optional(), maxAccelMmS2: AccelMmS2.optional() });

/** What the planner needs to know about the machine. */
export const Motion = fields({
  /** along the path, mm/s */
  maxSpeedMmS: SpeedMmS,
  /** along the path, mm/s² */
  accelMmS2: fields({ print: AccelMmS2, travel: AccelMmS2, retract: AccelMmS2 }),
  axes: fields({
    x: AxisLimits.optional(),
    y: AxisLimits.optional(),
    z: AxisLimits.optional(),
    e: AxisLimits.optional(),
  }).prefault({}),
  /** which moves the E limits apply to */
  extruderLimits: z.enum(["extrude-only", "every-move"]).default("extrude-only"),
  cornering: Cornering,
  /** a move without XYZ travel is a full stop */
  stopAtExtrudeOnly: z.boolean().default(true),
  /** arcs are cut into chords of this length, mm */
  arcSegmentMm: numberWithin(0.01, 50).default(1),
  firmwareRetract: fields({ lengthMm: numberWithin(0, 100).default(0), speedMmS: SpeedMmS.default(20) }).prefault({}),
  /** speed before the first F word, mm/s */
  initialSpeedMmS: SpeedMmS.default(25),
  /** whole file, or the number of blocks a small controller sees */
  lookAhead: z
    .union([z.literal("full"), wholeWithin(1, 100_000)], {
      error: 'must be "full" or a number of blocks from 1 to 100000',
    })
    .default("full"),
  /** limits set in the file apply, never above the machine's own */
  honourFileLimits: z.boolean().default(false),
  /** unit of the P word of a dwell */
  dwellP: z.enum(["ms", "s"]).default("ms"),
  /** G90 and G91 set the mode of E too; otherwise E follows M82/M83 and is also relative while G91 holds */
  axisModeSetsExtruder: z.boolean().default(false),
  filamentDiameterMm: numberWithin(0.5, 10).default(1.75),
});
export type Motion = z.infer<typeof Motion>;

/** A command that stops the print until someone continues it. */
export const Pause = fields({
  command: z.string().refine((command) => /^[A-Za-z_@][A-Za-z0-9_.-]{0,59}$/.test(command), {
    error: 'is no command. Give the word that starts the line, such as "M600" or "PAUSE"',
  }),
  /** the firmware reads no further line until the print goes on, so what follows may restore the lamp */
  blocking: z.boolean().default(false),
});
export type Pause = z.infer<typeof Pause>;

/** A machine document, `quenchline.machine/1`, with all defaults filled in. */
export const Machine = fields({
  format: z.literal("quenchline.machine/1"),
  name: Label,
  /** where a team keeps versions; it tells where the document comes from and is no part of what it says */
  version: Version.optional(),
  motion: Motion,
  channels: z.array(Channel).max(64).superRefine(checkChannels),
  pauses: z.array(Pause).max(64).superRefine(checkPauses).default([]),
  /** what surrounds the part; whatever is left out, the prediction takes from stated typical ranges */
  thermal: Thermal.optional(),
}).superRefine(checkThermal);
export type Machine = z.infer<typeof Machine>;

/**
 * Checks a machine document and fills in its defaults.
 *
 * @param json parsed JSON
 * @throws Refusal `bad-machine` naming every problem with its path
 */
export function parseMachine(json: unknown): Machine {
  return parseDocument(Machine, json, "machine");
}

/** The document as JSON text; equal machines give equal text, and `parseMachine` reads it back unchanged. */
export function writeMachine(machine: Machine): string {
  return writeDocument(Machine, machine);
}
