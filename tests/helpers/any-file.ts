import fc from "fast-check";
import { heights, marker, ring, START } from "#tests/helpers/part.ts";
import { latin } from "#tests/helpers/reading.ts";
import { moveLine, wordLine } from "#tests/helpers/words.ts";

/** Files of any kind: text in every dialect, damage, and plain noise. */

const known = fc.constantFrom(
  ...START,
  ...heights(3).flatMap((z, k) => [...marker(k), ...ring(z)]),
  "M106 S128",
  "m106p2s.5",
  "M107",
  "M106",
  "M106 P2 L0.2 ;ql",
  "M42 P4 S1",
  "SET_FAN_SPEED FAN=a SPEED=0.5",
  "SET_PIN PIN='a;b' VALUE={x}",
  "SET_VELOCITY_LIMIT ACCEL=500 VELOCITY=20",
  "START_PRINT EXTRUDER_TEMP=385",
  "G2 X60 Y60 I5 J5 E1",
  "G3 I-5 E1",
  "G2 X70 R10",
  "G18",
  "G91",
  "G20",
  "G92 E0",
  "G92",
  "G10",
  "G11",
  "G4 P100",
  "M204 S500",
  "M220 S50",
  "T1",
  "M600",
  "M0 wait",
  "M117 2*3 M106 S1",
  "N1 M107*36",
  "N5 G28*22",
  "N7 G1 X2.0 Y2.0 F3000.0*85",
  ";TYPE:WALL-OUTER",
  ";Z:0.4",
  ";HEIGHT:0.2",
  "; filament_diameter = 2.85",
  ';quenchline {"engine":"1"}',
  "(comment (nested))G1X5E1",
  "(unclosed",
  "%",
  "/G1 X5",
  `G1 X${"9".repeat(40)}`,
  "G1 X1e5 E1",
  "G1 X60 Y60 Z0.35 E2",
  "G1 X99 Z0.1 E2",
);

const end = fc.constantFrom("\n", "\n", "\n", "\r\n", "\r", "");

const noise = fc.uint8Array({ min: 1, maxLength: 12 }).map((bytes) => String.fromCharCode(...bytes));

/** A wrong checksum ends a reading at once, so most lines have none. */
const unchecked = wordLine.map((words) => words.replace(/\*\d+/, ""));

const line = fc.oneof(
  { weight: 60, arbitrary: known },
  { weight: 15, arbitrary: moveLine },
  { weight: 15, arbitrary: unchecked },
  { weight: 8, arbitrary: noise },
  { weight: 1, arbitrary: wordLine },
);

const text = fc
  .record({
    head: fc.constantFrom("", "", "\u00ef\u00bb\u00bf", `${START.join("\n")}\n`),
    lines: fc.array(
      fc.tuple(line, end).map((parts) => parts.join("")),
      { maxLength: 60 },
    ),
  })
  .map(({ head, lines }) => latin(head + lines.join("")));

export const anyFile: fc.Arbitrary<Uint8Array> = fc.oneof(
  { weight: 6, arbitrary: text },
  { weight: 1, arbitrary: fc.uint8Array({ maxLength: 800 }) },
);

/** Places at which a file of this many bytes is cut, ascending. */
export const cuts = fc.array(fc.nat(2000), { maxLength: 12 }).map((places) => places.sort((a, b) => a - b));
