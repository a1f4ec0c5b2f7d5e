import type { Channel, Machine } from "#shared/formats/machine.ts";
import { LineKind, type LineScan } from "#shared/gcode/scan-line.ts";
import type { PauseForms } from "#shared/prove/pause-line.ts";

/** What a line does to an output of the machine. */
export interface OutputSetting {
  what: "output";
  /** index into machine.channels */
  channel: number;
  /** `mixed`: a duty and something else, or a duty that is hidden */
  does: "duty" | "configuration" | "mixed";
  /** 0-1; NaN where it is hidden or there is none */
  duty: number;
}

export interface PauseCommand {
  what: "pause";
  /** in capitals, e.g. `M600` */
  command: string;
}

/**
 * Says which lines set an output or pause the print. It works on the text of the line and shares nothing with the reader
 * that found these lines for the tuning: where the two disagree, the proof fails.
 */
export class OutputClassifier {
  private readonly channels: readonly Channel[];
  private readonly pauses: PauseForms;

  constructor({ channels }: Machine, pauses: PauseForms) {
    this.channels = channels;
    this.pauses = pauses;
  }

  /** @param code the command without line number, checksum and comment */
  classify(code: string, kind: LineScan["kind"]): OutputSetting | PauseCommand | undefined {
    if (kind === LineKind.named) return this.named(code);
    if (kind !== LineKind.words && kind !== LineKind.text) return undefined;
    const words = wordsOf(kind === LineKind.text ? (/^.*?m\s*\d+/i.exec(code)?.[0] ?? "") : code);
    return this.pauseAmong(words) ?? this.output(words);
  }

  private pauseAmong(words: readonly Word[]): PauseCommand | undefined {
    const commands = words.filter(({ letter }) => letter === "M").map(({ value }) => `M${value}`);
    const command = commands.find((candidate) => this.pauses.has(candidate));
    return command === undefined ? undefined : { what: "pause", command };
  }

  private output(words: readonly Word[]): OutputSetting | undefined {
    const command = words.find(
      ({ letter, value }) => letter === "M" && (value === 106 || value === 107 || value === 42),
    );
    if (!command) return undefined;
    const all = (letter: string): number[] => words.filter((word) => word.letter === letter).map(({ value }) => value);
    const [p, s] = [all("P"), all("S")].map(settled);
    // Without a value a fan goes to full power, and a pin stays as it is.
    if (command.value === 42 && (all("P").length === 0 || Number.isNaN(s))) return undefined;
    const index = Number.isNaN(p) ? 0 : p;
    const by = command.value === 42 ? "pin" : "fan-index";
    const channel = this.channels.findIndex(({ drive }) =>
      drive.by === "pin"
        ? by === "pin" && drive.pin === index
        : drive.by === "fan-index" && by === drive.by && drive.index === index,
    );
    if (channel < 0) return undefined;
    const counts = [all("P").length, all("S").length];
    const plain = words.length === 1 + counts[0] + counts[1] && Math.max(...counts) <= 1;
    if (command.value === 107) return { what: "output", channel, does: plain ? "duty" : "mixed", duty: 0 };
    const duty = Number.isNaN(s) ? Number.NaN : this.duty(channel, s);
    if (plain) return { what: "output", channel, does: "duty", duty: Number.isNaN(s) ? 1 : duty };
    const settings = words.every((word) => word === command || SETTINGS.includes(word.letter));
    const does = command.value === 106 && settings && Number.isNaN(s) ? "configuration" : "mixed";
    return { what: "output", channel, does, duty };
  }

  private named(code: string): OutputSetting | PauseCommand | undefined {
    const name = (/^[\w.@]+/.exec(code)?.[0] ?? "").toUpperCase();
    if (this.pauses.has(name)) return { what: "pause", command: name };
    const [targetKey, valueKey, by] =
      name === "SET_FAN_SPEED"
        ? ["FAN", "SPEED", "named-fan"]
        : name === "SET_PIN"
          ? ["PIN", "VALUE", "named-pin"]
          : [];
    if (targetKey === undefined) return undefined;
    const pairs = keysOf(code.slice(name.length));
    const target = pairs.get(targetKey)?.toLowerCase();
    const channel = this.channels.findIndex(
      ({ drive }) => drive.by === by && "name" in drive && drive.name.toLowerCase() === target,
    );
    if (channel < 0) return undefined;
    const text = pairs.get(valueKey!) ?? "";
    const value = text === "" ? Number.NaN : Number(text);
    const plain = pairs.size === 2 && Number.isFinite(value);
    return { what: "output", channel, does: plain ? "duty" : "mixed", duty: this.duty(channel, value) };
  }

  /** A written value as a duty. Where full power is 1, firmware reads a larger value as 0-255. */
  private duty(channel: number, value: number): number {
    const { drive } = this.channels[channel];
    let full = drive.by === "named-fan" ? 1 : drive.fullScale;
    if ((drive.by === "fan-index" || drive.by === "pin") && full === 1 && value > 1) full = 255;
    return Math.max(0, Math.min(1, value / full));
  }
}

/** Words of M106 that set how a fan works, not how fast it runs. */
const SETTINGS = "PLXBHFIRACKQV";

/** Of a word that stands several times the last counts; one without a number makes the others count for nothing. */
const settled = (values: readonly number[]): number =>
  values.some(Number.isNaN) ? Number.NaN : (values[values.length - 1] ?? Number.NaN);

/** A letter in capitals and its number; NaN where it stands alone. */
interface Word {
  letter: string;
  value: number;
}

function wordsOf(code: string): Word[] {
  let bare = code;
  while (/\([^()]*\)/.test(bare)) bare = bare.replace(/\([^()]*\)/g, " ");
  const words: Word[] = [];
  for (const [, letter, number] of bare.matchAll(/([a-z])\s*([-+]?[\d.\s]*)/gi)) {
    const digits = number.replace(/\s/g, "");
    words.push({ letter: letter.toUpperCase(), value: /\d/.test(digits) ? Number(digits) : Number.NaN });
  }
  return words;
}

function keysOf(text: string): Map<string, string> {
  const pairs = new Map<string, string>();
  for (const [, key, ...values] of text.matchAll(/([a-z_]\w*)\s*=\s*(?:"([^"]*)"|'([^']*)'|(\S*))/gi))
    pairs.set(key.toUpperCase(), values.find((value) => value !== undefined) ?? "");
  return pairs;
}
