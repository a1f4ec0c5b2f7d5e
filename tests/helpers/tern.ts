import { readFileSync } from "node:fs";
import { type Machine, parseMachine } from "#shared/formats/machine.ts";

/** A machine document with every optional field written out; what surrounds the part is no matter to these tests. */
const { thermal: _, ...document } = JSON.parse(
  readFileSync(new URL("../../samples/machines/tern.json", import.meta.url), "utf8"),
);

/** What a test changes of the machine: fields of `motion`, and the channels or pauses as a whole. */
export interface Changes {
  motion?: object;
  channels?: object[];
  pauses?: object[];
}

/** The sample machine that the reference timings were made with, or one that differs from it in a few fields. */
export const tern = ({ motion = {}, ...lists }: Changes = {}): Machine =>
  parseMachine({ ...document, ...lists, motion: { ...document.motion, ...motion } });

/** The same machine cornering by another rule. */
export const ternCornering = (cornering: object, motion: object = {}): Machine =>
  tern({ motion: { cornering, ...motion } });

export const SQUARE_CORNER = { rule: "square-corner-velocity", speedMmS: 5, cruiseRatio: 0, extruderStepMmS: 1 };
export const DEVIATION = { rule: "junction-deviation", deviationMm: 0.013 };
export const JERK = { rule: "axis-jerk", jerkMmS: { x: 8, y: 8, z: 0.4, e: 5 } };

/** A machine for each cornering rule, and for what changes planning besides. */
export const EVERY_RULE: [rule: string, machine: Machine][] = [
  ["square corner", ternCornering(SQUARE_CORNER)],
  ["square corner with a least cruise", ternCornering({ ...SQUARE_CORNER, cruiseRatio: 0.5 })],
  ["square corner without stops", ternCornering(SQUARE_CORNER, { stopAtExtrudeOnly: false })],
  ["junction deviation", ternCornering(DEVIATION)],
  [
    "junction deviation with axis limits",
    ternCornering(DEVIATION, {
      stopAtExtrudeOnly: false,
      axes: { x: { maxAccelMmS2: 900 }, y: { maxSpeedMmS: 100 }, z: { maxSpeedMmS: 10, maxAccelMmS2: 100 } },
    }),
  ],
  ["axis jerk", ternCornering(JERK, { stopAtExtrudeOnly: false, extruderLimits: "every-move" })],
  ["axis jerk with stops", ternCornering(JERK)],
];
