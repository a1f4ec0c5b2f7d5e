import type { Channel, Machine } from "#shared/formats/machine.ts";
import { bit, type LineScan } from "#shared/gcode/scan-line.ts";

/** What a line does to one output. `duty` is 0–1, NaN when it is hidden or there is none. */
export interface OutputCommand {
  output: string;
  /** raw value and the scale it is read on follow the channel's drive, so the duty is computed by `dutyOn` */
  value: number;
  does: "duty" | "configuration" | "mixed";
}

/** Name of the output that a channel drives; two channels with one name would be one wire. */
export function outputOf(channel: Channel): string {
  const { drive } = channel;
  switch (drive.by) {
    case "fan-index":
      return `fan ${drive.index}`;
    case "pin":
      return `pin ${drive.pin}`;
    case "named-fan":
      return `named fan ${drive.name.toUpperCase()}`;
    case "named-pin":
      return `named pin ${drive.name.toUpperCase()}`;
  }
}

/** Index into `machine.channels` by output name. */
export const channelsByOutput = (machine: Machine): Map<string, number> =>
  new Map(machine.channels.map((channel, index) => [outputOf(channel), index]));

/**
 * The duty that a written value means on this channel: values are read on the drive's own scale, and where full scale
 * is 1, a value above 1 is read as 0–255 (REFERENCE G13: `S1` is 0.4 % on one firmware family and 100 % on another).
 */
export function dutyOn(channel: Channel, value: number): number {
  const { drive } = channel;
  const scale = drive.by === "named-fan" ? 1 : drive.fullScale;
  const byIndex = drive.by === "fan-index" || drive.by === "pin";
  const duty = byIndex && scale === 1 && value > 1 ? value / 255 : value / scale;
  return Math.min(Math.max(duty, 0), 1);
}

/** The M words that set an output. */
export const isOutputCode = (code: number): boolean => code === 106 || code === 107 || code === 42;

const P = bit("P");
const S = bit("S");
const PLAIN = bit("M") | bit("N") | P | S;
const FAN_CONFIGURATION = ["L", "X", "B", "H", "F", "I", "R", "A", "C", "K", "Q", "V"].reduce((m, c) => m | bit(c), 0);

/**
 * `M106`, `M107`, `M42`: the output they set, or undefined for any other M word.
 *
 * @param code the M word, one of the line's
 */
export function numberedOutput(scan: LineScan, code: number): OutputCommand | undefined {
  const { value, mask, bare } = scan;
  const index = (mask & P & ~bare) !== 0 ? value[15] : 0;
  const others = mask & ~PLAIN;
  const alone = others === 0 && scan.repeated === 0 && scan.commands === 1;
  if (code === 107) return { output: `fan ${index}`, value: 0, does: alone && whole(index) ? "duty" : "mixed" };
  if (!isOutputCode(code)) return undefined;
  const output = code === 106 ? `fan ${index}` : `pin ${index}`;
  const hasS = (mask & S) !== 0 && (bare & S) === 0;
  // Without S a fan goes to full power; a pin is left as it is.
  if (code === 42 && ((mask & P) === 0 || !hasS)) return undefined;
  if (!whole(index)) return { output, value: Number.NaN, does: "mixed" };
  if (alone) return { output, value: hasS ? value[18] : Number.POSITIVE_INFINITY, does: "duty" };
  if (code === 106 && !hasS && (others & ~FAN_CONFIGURATION) === 0 && others !== 0 && scan.commands === 1)
    return { output, value: Number.NaN, does: "configuration" };
  return { output, value: hasS ? value[18] : Number.NaN, does: "mixed" };
}

const whole = (n: number): boolean => Number.isInteger(n) && n >= 0;

/** `SET_FAN_SPEED FAN=… SPEED=…`, `SET_PIN PIN=… VALUE=…`: the output they set, or undefined for any other name. */
export function namedOutput(name: string, parameters: Map<string, string>): OutputCommand | undefined {
  const shape =
    name === "SET_FAN_SPEED"
      ? { of: "FAN", to: "SPEED", prefix: "named fan" }
      : name === "SET_PIN"
        ? { of: "PIN", to: "VALUE", prefix: "named pin" }
        : undefined;
  if (!shape) return undefined;
  const target = parameters.get(shape.of);
  if (target === undefined) return undefined;
  const text = parameters.get(shape.to);
  const value = text === undefined || text.trim() === "" ? Number.NaN : Number(text);
  const alone = parameters.size === 2 && Number.isFinite(value);
  return { output: `${shape.prefix} ${target.toUpperCase()}`, value, does: alone ? "duty" : "mixed" };
}

/** A named command taken apart: `NAME KEY=value KEY="value with blanks"`. Names and keys in capitals, quotes removed. */
export function parseNamed(text: string): { name: string; parameters: Map<string, string> } {
  const name = /^[@\w.]+/.exec(text)?.[0] ?? "";
  const parameters = new Map<string, string>();
  const pattern = /([A-Za-z_][\w]*)\s*=\s*("[^"]*"|'[^']*'|[^\s;]*)/g;
  for (const [, key, value] of text.slice(name.length).matchAll(pattern))
    parameters.set(key.toUpperCase(), value.replace(/^(["'])(.*)\1$/, "$2"));
  return { name: name.toUpperCase(), parameters };
}
