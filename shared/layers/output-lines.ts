import type { Channel, Machine } from "#shared/formats/machine.ts";
import type { LineScan } from "#shared/gcode/scan-line.ts";
import { bit } from "#shared/gcode/scan-line.ts";
import type { Findings } from "#shared/layers/findings.ts";
import type { LayerBuilder } from "#shared/layers/layer-builder.ts";
import type { ControlLine, OutputUse, PauseLine } from "#shared/layers/reading.ts";
import {
  channelsByOutput,
  dutyOn,
  isOutputCode,
  namedOutput,
  numberedOutput,
  type OutputCommand,
  parseNamed,
} from "#shared/machine/output-command.ts";
import { Refusal } from "#shared/refusal.ts";

/** Pauses that printer firmware and hosts know, whether or not the machine document lists them. */
const KNOWN_PAUSES = ["M0", "M1", "M25", "M226", "M600", "M601", "M125", "PAUSE", "@PAUSE"];
/** More fan and heater lines than this is no sliced part. */
const MAX_CONTROLS = 1_000_000;
/** Outputs without a channel, and lines of each, that are kept; a damaged file may name any number. */
const MAX_FOREIGN = 32;
const MAX_FOREIGN_LINES = 10_000;
/** Named commands of the firmware family that drives its part fan on every M106, whatever its P says (PLANNERS, A 8). */
const INDEX_BLIND =
  /^(SET_(FAN_SPEED|PIN|VELOCITY_LIMIT|PRESSURE_ADVANCE|GCODE_OFFSET|HEATER_TEMPERATURE)|EXCLUDE_OBJECT\w*|TEMPERATURE_WAIT|BED_MESH_\w+|(SAVE|RESTORE)_GCODE_STATE)$/;
/** Named commands that are known not to drive an output. */
const HARMLESS = /^(SET_(VELOCITY_LIMIT|PRESSURE_ADVANCE|GCODE_OFFSET)|EXCLUDE_OBJECT\w*|(SAVE|RESTORE)_GCODE_STATE)$/;
/** A command of an output anywhere in a line. */
const OUTPUT_WORD = /m\s*0*(106|107|42)(?!\d)|SET_(PIN|FAN_SPEED)/i;
const P_BIT = bit("P");

/** Finds the lines that drive outputs or pause the print, and how the file addresses its outputs. */
export class OutputLines {
  readonly controls: ControlLine[] = [];
  readonly pauses: PauseLine[] = [];
  readonly use: OutputUse = {};
  /** lines for outputs that no channel drives, by the output's name */
  readonly foreign = new Map<string, { offset: number; line: number }[]>();

  private readonly channels: readonly Channel[];
  private readonly byOutput: Map<string, number>;
  private readonly pauseNumbers = new Set<number>();
  private readonly pauseNames = new Set<string>();
  private readonly findings: Findings;
  private readonly builder: LayerBuilder;
  private readonly macros = new Set<string>();

  constructor(machine: Machine, findings: Findings, builder: LayerBuilder) {
    this.channels = machine.channels;
    this.byOutput = channelsByOutput(machine);
    this.findings = findings;
    this.builder = builder;
    for (const command of [...KNOWN_PAUSES, ...machine.pauses.map((pause) => pause.command)]) {
      const number = /^M(\d+)$/i.exec(command)?.[1];
      if (number) this.pauseNumbers.add(Number(number));
      else this.pauseNames.add(command.toUpperCase());
    }
  }

  /** A line with an M word. Returns what has to learn its print time, if anything. */
  numbered(buf: Uint8Array, scan: LineScan, ours: ControlLine["ours"]): ControlLine | PauseLine | undefined {
    const code = scan.value[12];
    if (scan.mCount > 1) this.severalWords(buf, scan);
    if (this.pauseNumbers.has(code)) return this.pause(`M${code}`);
    if (code === 98 || code === 32 || code === 808) this.macro(`M${code}`);
    const command = numberedOutput(scan, code);
    if (!command) return undefined;
    const line = this.builder.scan.line;
    if (code !== 42 && !ours) {
      if ((scan.mask & P_BIT) !== 0 && scan.value[15] > 0) this.use.indexedFanLine ??= line;
      if ((scan.mask & P_BIT) === 0) this.use.bareFanLine ??= line;
    }
    return this.control(command, codeText(buf, scan.codeStart, scan.codeEnd), ours);
  }

  /** Several M words on one line, of which one drives an output or pauses: firmware may run one of them, or all. */
  private severalWords(buf: Uint8Array, scan: LineScan): void {
    for (const code of scan.mWords.subarray(0, scan.mCount))
      if (this.pauseNumbers.has(code) || isOutputCode(code)) this.noteUnclear(buf, scan.codeStart, scan.codeEnd);
  }

  /** A line that can't be read, but firmware that skips what it doesn't know may find a command for an output in it. */
  unreadable(buf: Uint8Array, scan: LineScan): void {
    if (OUTPUT_WORD.test(codeText(buf, scan.start, scan.textEnd))) this.noteUnclear(buf, scan.start, scan.textEnd);
  }

  private noteUnclear(buf: Uint8Array, start: number, end: number): void {
    this.use.unclear ??= { code: codeText(buf, start, end), line: this.builder.scan.line };
  }

  /** A named command, as text. */
  named(text: string, ours: ControlLine["ours"]): ControlLine | PauseLine | undefined {
    const { name, parameters } = parseNamed(text);
    if (this.pauseNames.has(name)) return this.pause(name);
    if (INDEX_BLIND.test(name)) this.use.namedCommand ??= { name, line: this.builder.scan.line };
    const command = namedOutput(name, parameters);
    if (command) return this.control(command, text.trimEnd(), ours);
    if (!HARMLESS.test(name)) this.macro(name);
    return undefined;
  }

  private control(command: OutputCommand, code: string, ours: ControlLine["ours"]): ControlLine | undefined {
    const index = this.byOutput.get(command.output);
    if (index === undefined) {
      if (ours) this.use.strayOwnLine ??= this.builder.scan.line;
      else this.noteForeign(command.output);
      return undefined;
    }
    if (this.controls.length >= MAX_CONTROLS)
      throw new Refusal(
        "too-many-controls",
        `more than ${MAX_CONTROLS} fan and heater lines`,
        "Check that the file is a sliced part; no plan can be laid over this many commands.",
        { line: this.builder.scan.line },
      );
    const channel = this.channels[index];
    if (command.value > 0 && !ours) this.checkScale(channel, command.value);
    const line: ControlLine = {
      channel: index,
      line: this.builder.scan.line,
      offset: this.builder.offset(),
      length: this.builder.lineBytes(),
      timeS: 0,
      layer: 0,
      does: command.does,
      duty: dutyOn(channel, command.value),
      code,
      ours,
    };
    this.controls.push(line);
    return line;
  }

  private noteForeign(output: string): void {
    const lines = this.foreign.get(output) ?? [];
    if (lines.length === 0 && this.foreign.size < MAX_FOREIGN) this.foreign.set(output, lines);
    if (lines.length < MAX_FOREIGN_LINES) lines.push({ offset: this.builder.offset(), line: this.builder.scan.line });
  }

  private checkScale({ id, drive }: Channel, value: number): void {
    const scale = drive.by === "named-fan" ? 1 : drive.fullScale;
    if (scale === 255 && value < 1)
      this.findings.add(
        "scale-mixed",
        "warning",
        `a value of ${value} on channel ${id}, whose full scale is 255, is ${((value / 255) * 100).toFixed(2)} %; on a 0–1 scale it would be ${(value * 100).toFixed(0)} %`,
        { line: this.builder.scan.line },
      );
    if (scale === 1 && value > 1 && Number.isFinite(value))
      this.findings.add(
        "scale-mixed",
        "warning",
        `a value of ${value} on channel ${id}, whose full scale is 1, is read as 0–255`,
        {
          line: this.builder.scan.line,
        },
      );
  }

  private pause(command: string): PauseLine {
    const { builder } = this;
    const pause = {
      command,
      line: builder.scan.line,
      offset: builder.offset(),
      length: builder.lineBytes(),
      timeS: 0,
      layer: 0,
    };
    this.pauses.push(pause);
    return pause;
  }

  private macro(name: string): void {
    if (this.macros.has(name) || this.macros.size >= 100) return;
    this.macros.add(name);
    this.findings.add(
      "macro",
      "info",
      `${name} is a macro or named command: what it does to fans and heaters can't be seen in this file`,
      {
        line: this.builder.scan.line,
      },
    );
  }
}

/** Longest command text that is kept; a duty command is far shorter. */
const CODE_BYTES = 256;

/** A command's text without its line number and the blanks around it. */
function codeText(buf: Uint8Array, start: number, end: number): string {
  return String.fromCharCode(...buf.subarray(start, Math.min(end, start + CODE_BYTES)))
    .replace(/^[Nn]\s*\d+\s*/, "")
    .trim();
}
