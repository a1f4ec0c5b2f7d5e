import type { Machine } from "#shared/formats/machine.ts";
import type { OwnTag } from "#shared/gcode/own-lines.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { Agreement } from "#shared/prove/agreement.ts";
import type { Comparison, OwnEntry, Removal, Standing } from "#shared/prove/comparison.ts";
import type { LineLook } from "#shared/prove/line-look.ts";
import type { LineNumbers } from "#shared/prove/line-numbers.ts";
import { OutputClassifier, type OutputSetting, type PauseCommand } from "#shared/prove/output-line.ts";
import { ownDuty } from "#shared/prove/own-command.ts";
import { ownFormProblem, ownKind } from "#shared/prove/own-line.ts";
import { pauseForms } from "#shared/prove/pause-line.ts";
import type { Sameness } from "#shared/prove/same-line.ts";

/** More lines of ours than this is no tuning. */
const MAX_OWN_LINES = 1_000_000;
/** Longest text of one that is kept; what is longer is none of ours. */
const OWN_BYTES = 8192;

/** Keeps the books of the comparison. Memory grows with lines of ours and output commands, not with bytes. */
export class Recorder {
  private readonly reading: Reading;
  private readonly machine: Machine;
  private readonly numbers: LineNumbers;
  private readonly classifier: OutputClassifier;
  private readonly agreement: Agreement;
  private readonly removals = new Map<string, Removal>();
  private readonly found: Comparison = {
    kept: 0,
    renumbered: 0,
    removed: 0,
    inserted: 0,
    entries: [],
    removals: [],
    gaps: { from: [], to: [] },
    numbering: { followed: 0 },
    agreed: 0,
  };
  /** byte of the original behind the last kept line, once a line was taken out or put in since; -1 before that */
  private gapFrom = -1;
  private gapEntries = 0;
  private classified: OutputSetting | PauseCommand | undefined;
  private classifiedLine = -1;

  constructor(reading: Reading, machine: Machine, numbers: LineNumbers) {
    this.reading = reading;
    this.machine = machine;
    this.numbers = numbers;
    this.classifier = new OutputClassifier(machine, pauseForms(machine));
    this.agreement = new Agreement(reading);
  }

  /** lines were taken out or put in since the last kept line */
  get gapIsOpen(): boolean {
    return this.gapFrom >= 0;
  }

  get goesOn(): boolean {
    return this.found.difference === undefined;
  }

  /** Lines that are equal and of no interest. */
  passed(same: number, renumbered: number): void {
    this.found.kept += same;
    this.found.renumbered += renumbered;
  }

  kept(original: LineLook, tuned: LineLook, sameness: Sameness, offset: number): void {
    const { found } = this;
    this.closeGap(offset);
    const standing = { tunedLine: this.tunedLine, keptBefore: found.kept + found.renumbered, from: offset, to: offset };
    this.numbers.note(tuned, standing.tunedLine);
    const command = this.classify(original);
    this.agreement.note(command, offset, this.originalLine, false);
    if (command?.what === "output")
      found.entries.push({ ...standing, what: "file", code: original.code, set: command });
    if (command?.what === "pause") {
      const endsAt = offset + original.next - original.start;
      found.entries.push({ ...standing, what: "pause", command: command.command, endsAt });
    }
    if (sameness === "renumbered") found.renumbered++;
    else found.kept++;
  }

  /** Whether a line of the original sets an output of the machine. */
  sets(original: LineLook): boolean {
    return this.classify(original)?.what === "output";
  }

  /** Whether a line of the original is ours, of an earlier tuning: a tag behind any other command means nothing. */
  isEarlierOwn(original: LineLook): boolean {
    const own = ownKind(original);
    return own === "provenance" || (own !== undefined && this.sets(original));
  }

  removed(original: LineLook, offset: number): void {
    this.openGap(offset);
    const ours = this.isEarlierOwn(original);
    const command = this.classify(original);
    this.agreement.note(command, offset, this.originalLine, ours);
    const { window } = this.reading;
    const inWindow = offset >= window.start.offset && offset < window.end.offset;
    const [channel, does] = command?.what === "output" ? [command.channel, command.does] : [-1, "nothing" as const];
    const key = `${channel} ${does} ${ours} ${inWindow}`;
    const removal = this.removals.get(key);
    if (removal) removal.lines++;
    else this.removals.set(key, { channel, does, ours, inWindow, lines: 1, firstLine: this.originalLine });
    this.found.removed++;
  }

  inserted(tuned: LineLook, own: "provenance" | OwnTag, offset: number): void {
    const { found } = this;
    if (found.inserted >= MAX_OWN_LINES) {
      this.part(undefined, tuned, offset, "there are too many lines of ours");
      return;
    }
    this.openGap(offset);
    const standing = {
      tunedLine: this.tunedLine,
      keptBefore: found.kept + found.renumbered,
      from: this.gapFrom,
      to: -1,
    };
    this.numbers.note(tuned, standing.tunedLine);
    if (own === "provenance")
      found.entries.push({
        ...standing,
        what: "provenance",
        text: tuned.text(tuned.start, Math.min(tuned.textEnd, tuned.start + OWN_BYTES)),
        oddEnd: this.endsOddly(tuned),
      });
    else found.entries.push({ ...this.ownCommand(tuned, own), ...standing });
    found.inserted++;
  }

  /** The files part here. */
  part(original: LineLook | undefined, tuned: LineLook | undefined, offset: number, message?: string): void {
    this.found.difference ??= {
      message: message ?? partMessage(original, tuned),
      offset,
      ...(original || message === undefined ? { originalLine: this.originalLine } : {}),
      ...(tuned || message === undefined ? { tunedLine: this.tunedLine } : {}),
    };
  }

  end(): Comparison {
    const { found, numbers } = this;
    this.closeGap(this.reading.file.bytes);
    if (this.goesOn) this.agreement.end();
    found.removals = [...this.removals.values()];
    found.numbering = { followed: numbers.followed, wrong: numbers.wrong };
    found.agreed = this.agreement.agreed;
    found.disagreement = this.agreement.disagreement;
    return found;
  }

  private get originalLine(): number {
    const { kept, renumbered, removed } = this.found;
    return kept + renumbered + removed + 1;
  }

  private get tunedLine(): number {
    const { kept, renumbered, inserted } = this.found;
    return kept + renumbered + inserted + 1;
  }

  private classify(original: LineLook): OutputSetting | PauseCommand | undefined {
    if (this.classifiedLine !== this.originalLine) {
      this.classified = this.classifier.classify(original.code, original.scan.kind);
      this.classifiedLine = this.originalLine;
    }
    return this.classified;
  }

  private ownCommand(tuned: LineLook, tag: OwnTag): Omit<OwnEntry, keyof Standing> {
    const { code } = tuned;
    let problem = ownFormProblem(tuned, this.reading.file.numbered);
    if (this.endsOddly(tuned)) problem ??= "its line does not end as the lines of the file do";
    const own: Omit<OwnEntry, keyof Standing> = { what: "own", tag, code };
    for (const [channel, { drive }] of this.machine.channels.entries()) {
      const duty = ownDuty(code, drive);
      if (duty !== undefined) own.set = { channel, duty };
    }
    if (problem !== undefined) own.problem = problem;
    return own;
  }

  /** A line of ours ends as the lines of the file do, without a terminator only at a file's end that has none. */
  private endsOddly({ terminator }: LineLook): boolean {
    const { newline, finalNewline } = this.reading.file;
    return terminator === "" ? finalNewline : !LINE_ENDS[newline].includes(terminator);
  }

  private openGap(offset: number): void {
    this.numbers.edited = true;
    if (this.gapFrom >= 0) return;
    this.gapFrom = offset;
    this.gapEntries = this.found.entries.length;
  }

  private closeGap(offset: number): void {
    if (this.gapFrom < 0) return;
    const { entries, gaps } = this.found;
    if (offset > this.gapFrom) {
      gaps.from.push(this.gapFrom);
      gaps.to.push(offset);
    }
    this.gapFrom = -1;
    for (let k = this.gapEntries; k < entries.length; k++) entries[k].to = offset;
  }
}

/** By the file's kind of line end: those that a line of ours may have. */
export const LINE_ENDS = { lf: ["\n"], crlf: ["\r\n"], cr: ["\r"], mixed: ["\n", "\r\n", "\r"], none: ["\n"] };

function partMessage(original: LineLook | undefined, tuned: LineLook | undefined): string {
  if (!original) return `\`${tuned?.shown}\` stands behind the end of the original`;
  if (!tuned) return `\`${original.shown}\` of the original is missing`;
  return `\`${tuned.shown}\` stands where the original has \`${original.shown}\``;
}
