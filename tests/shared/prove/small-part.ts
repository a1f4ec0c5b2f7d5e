import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";

/** How a small part's file is written. */
export interface Dialect {
  newline?: string;
  numbered?: boolean;
  finalNewline?: boolean;
  byteOrderMark?: boolean;
  /** a pause in the third layer */
  pause?: string;
  /** named outputs in the place of indexed ones */
  named?: boolean;
  /** nothing stands behind the last laying move */
  bareEnd?: boolean;
  /** moves of a few seconds each, so that a duty may change several times in a layer */
  slow?: boolean;
}

const LAYERS = 6;

/** A square of six layers with two travels in each, a fan that the file drives and raises, and a start and end script. */
export function smallPart(dialect: Dialect = {}): string {
  const { newline = "\n", numbered = false, finalNewline = true, byteOrderMark = false } = dialect;
  const lines = partLines(dialect);
  const written = numbered ? numberedFrom(lines, 1) : lines;
  return (byteOrderMark ? "\xef\xbb\xbf" : "") + written.join(newline) + (finalNewline ? newline : "");
}

function partLines({ pause, named = false, bareEnd = false, slow = false }: Dialect): string[] {
  const fan = (s: number): string => (named ? `SET_FAN_SPEED FAN=part SPEED=${s / 256}` : `M106 S${s}`);
  const lines = [
    "; a small square, caf\xe9",
    "G21",
    "G90",
    "M82",
    "M104 S250",
    "G28",
    "M109 S400",
    "M42 P7 S90",
    fan(0),
    "G92 E0",
  ];
  let e = 0;
  const lay = (x: number, y: number): void => {
    e += 0.8;
    lines.push(`G1 X${x} Y${y} E${e.toFixed(2)} F${slow ? 400 : 1500}`);
  };
  for (let layer = 1; layer <= LAYERS; layer++) {
    lines.push(`;LAYER:${layer - 1}`, `G0 X10 Y10 Z${(layer * 0.2).toFixed(1)} F6000`);
    lay(40, 10);
    lay(40, 40);
    if (layer === 2) lines.push(fan(128));
    lines.push("G0 X12 Y38");
    lay(12, 12);
    lay(38, 12);
    if (layer === 4) lines.push(fan(255), "; bridge");
    lay(38, 38);
    if (layer === 4) lines.push(`${fan(100)} ; end of the bridge`);
    if (layer === 3 && pause) lines.push(pause);
    lines.push("M117 layer done, M106 S1", "G0 X20 Y20");
    lay(30, 30);
  }
  if (!bareEnd)
    lines.push("G0 Z20", named ? "SET_FAN_SPEED FAN=part SPEED=0" : "M107", "M104 S0", "; filament used: 1 m");
  return lines;
}

/** The lines with numbers and checksums in front of and behind every command. */
export function numberedFrom(lines: readonly string[], first: number): string[] {
  let number = first;
  return lines.map((line) => (line.startsWith(";") || line === "" ? line : withChecksum(`N${number++} ${line}`)));
}

/** A checksum stands behind the command and before a comment. */
export function withChecksum(line: string): string {
  const [, command, comment = ""] = /^([^;]*?)( ;.*)?$/.exec(line)!;
  const sum = [...command].reduce((xor, character) => xor ^ character.charCodeAt(0), 0);
  return `${command}*${sum}${comment}`;
}

export function smallMachine({ named = false, ...more }: { named?: boolean; fan?: object; lamp?: object } = {}) {
  const fan = named ? { by: "named-fan", name: "part" } : { by: "fan-index", index: 0, fullScale: 255 };
  const lamp = named ? { by: "named-pin", name: "lamp", fullScale: 1 } : { by: "fan-index", index: 2, fullScale: 255 };
  return parseMachine({
    format: "quenchline.machine/1",
    name: "Petrel \u2014 n\xb02",
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      cornering: { rule: "square-corner-velocity", speedMmS: 5 },
    },
    channels: [
      { id: "part-fan", kind: "fan", drive: fan, minDuty: 0.12, maxDuty: 0.9, ...more.fan },
      { id: "lamp", kind: "heater", drive: lamp, maxDuty: 0.8, ...more.lamp },
      { id: "shelf-fan", kind: "fan", drive: { by: "pin", pin: 7, fullScale: 255 } },
    ],
    pauses: [
      { command: "M0", blocking: true },
      { command: "M600", blocking: false },
    ],
  });
}

export function smallProfile(more: object = {}) {
  const curve = (channel: string, points: [number, number][]) => ({ channel, rule: "curve", over: "height", points });
  return parseProfile({
    format: "quenchline.profile/1",
    name: "Square, \u201cstiff\u201d",
    polymer: "PEEK",
    zones: [
      {
        name: "all",
        from: 0,
        unit: "mm",
        target: "semi-crystalline",
        cooling: curve("part-fan", [
          [0.2, 0],
          [0.5, 0.2],
          [1.2, 0.6],
        ]),
        heating: curve("lamp", [
          [0.2, 0.7],
          [1, 0.3],
        ]),
      },
    ],
    limits: { lamp: { maxDutyPerLayer: 0.2 } },
    ...more,
  });
}
