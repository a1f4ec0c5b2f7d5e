import type { Machine } from "#shared/formats/machine.ts";
import { MAX_LINE_BYTES } from "#shared/gcode/line-feeder.ts";
import type { Reading } from "#shared/layers/reading.ts";
import type { Comparison } from "#shared/prove/comparison.ts";
import { LineFeed } from "#shared/prove/line-feed.ts";
import { LineLook } from "#shared/prove/line-look.ts";
import { LineNumbers } from "#shared/prove/line-numbers.ts";
import { ownKind } from "#shared/prove/own-line.ts";
import { LINE_ENDS, Recorder } from "#shared/prove/recorder.ts";
import { runEqual } from "#shared/prove/run-equal.ts";
import { runNumbered } from "#shared/prove/run-numbered.ts";
import { sameLine } from "#shared/prove/same-line.ts";
import { numberedLineWatch, type Watch, watchFor } from "#shared/prove/watch.ts";

const BOM = [0xef, 0xbb, 0xbf];

export interface CompareInput {
  original: AsyncIterable<Uint8Array>;
  tuned: AsyncIterable<Uint8Array>;
  /** of the original */
  reading: Reading;
  machine: Machine;
}

/**
 * Walks through both files at once. Equal lines are run over; where the files differ, and at every line that sets an
 * output, pauses the print or is ours, the line is looked at as a whole and either explained or the difference that
 * ends the comparison. Both streams are read to their ends in any case.
 */
export async function compareStreams(input: CompareInput): Promise<Comparison> {
  const walk = new Walk(input);
  const found = await walk.run();
  await walk.drain();
  return found;
}

class Walk {
  private readonly original: LineFeed;
  private readonly tuned: LineFeed;
  private readonly numbered: boolean;
  private readonly watch: Watch;
  private readonly plain: Uint8Array;
  private readonly numbers = new LineNumbers();
  private readonly record: Recorder;
  private readonly theirs = new LineLook();
  private readonly ours = new LineLook();
  private readonly finalNewline: boolean;
  private readonly lineEnds: readonly string[];
  /** the last kept line has a terminator in one file only: what follows can only be ours */
  private openEnd = false;
  private tunedIsOpen = false;

  constructor({ original, tuned, reading, machine }: CompareInput) {
    this.original = new LineFeed(original);
    this.tuned = new LineFeed(tuned);
    this.numbered = reading.file.numbered;
    this.finalNewline = reading.file.finalNewline;
    this.lineEnds = LINE_ENDS[reading.file.newline];
    this.watch = watchFor(machine, this.numbered);
    this.plain = numberedLineWatch(this.watch);
    this.record = new Recorder(reading, machine, this.numbers);
  }

  async run(): Promise<Comparison> {
    const { original, tuned, record } = this;
    await this.skipByteOrderMark();
    do {
      if (!record.gapIsOpen) this.runOverEqualLines();
      while (!original.complete() && this.isShort(original)) await original.more();
      while (!tuned.complete() && this.isShort(tuned)) await tuned.more();
    } while (record.goesOn && this.step());
    return record.end();
  }

  async drain(): Promise<void> {
    await this.original.drain();
    await this.tuned.drain();
  }

  private runOverEqualLines(): void {
    const { original, tuned, watch, record } = this;
    if (this.numbered) {
      const { same, renumbered } = runNumbered(original, tuned, watch, this.plain, this.numbers);
      record.passed(same, renumbered);
    } else record.passed(runEqual(original, tuned, watch), 0);
  }

  /** Looks at the current line of each file. @returns false at the end of both, or where they part */
  private step(): boolean {
    const { original, tuned, record, theirs, ours, numbered } = this;
    if (original.finished && tuned.finished) return this.atTheEnd();
    if (!original.finished) {
      theirs.take(original);
      if (record.isEarlierOwn(theirs)) return this.takeOut();
    }
    if (tuned.finished) return record.sets(theirs) ? this.takeOut() : this.part();
    ours.take(tuned);
    this.tunedIsOpen = !tuned.terminated;
    if (!original.finished && !this.openEnd) {
      // Where lines of ours end the file and it has no final terminator, one is put before them and goes with them.
      const openEnd =
        original.terminated !== tuned.terminated && this.lineEnds.includes(theirs.terminator + ours.terminator);
      const sameness = sameLine(theirs, ours, numbered, openEnd);
      if (sameness !== "other") {
        record.kept(theirs, ours, sameness, original.offset);
        this.openEnd = openEnd;
        original.advance();
        tuned.advance();
        return true;
      }
    }
    const own = ownKind(ours);
    if (own !== undefined) {
      record.inserted(ours, own, original.offset);
      tuned.advance();
      return true;
    }
    return !original.finished && record.sets(theirs) ? this.takeOut() : this.part();
  }

  private takeOut(): boolean {
    this.record.removed(this.theirs, this.original.offset);
    this.original.advance();
    return true;
  }

  private atTheEnd(): false {
    if (this.tunedIsOpen === this.finalNewline)
      this.record.part(
        undefined,
        undefined,
        this.original.offset,
        "only one of the files has a line end at its very end",
      );
    return false;
  }

  private part(): boolean {
    const { original, tuned, record } = this;
    record.part(original.finished ? undefined : this.theirs, tuned.finished ? undefined : this.ours, original.offset);
    return false;
  }

  private isShort(feed: LineFeed): boolean {
    if (!feed.tooLong) return true;
    this.record.part(undefined, undefined, this.original.offset, `a line is longer than ${MAX_LINE_BYTES >> 20} MiB`);
    return false;
  }

  /** A byte order mark is no part of the first line. */
  private async skipByteOrderMark(): Promise<void> {
    const feeds = [this.original, this.tuned];
    for (const feed of feeds) while (feed.end < BOM.length && (await feed.more()));
    if (!feeds.every(({ buf, end }) => end >= BOM.length && BOM.every((byte, k) => buf[k] === byte))) return;
    for (const feed of feeds) {
      feed.start = BOM.length;
      feed.pos = BOM.length;
    }
  }
}
