import type { Reading } from "#shared/layers/reading.ts";
import type { Difference } from "#shared/prove/comparison.ts";
import type { OutputSetting, PauseCommand } from "#shared/prove/output-line.ts";

/** Duties come from the same text by two ways of computing. */
const SAME_DUTY = 1e-9;

/** Compares what this reader finds in the original with what the reading lists, line by line as both come up. */
export class Agreement {
  agreed = 0;
  disagreement: Difference | undefined;

  private readonly reading: Reading;
  private control = 0;
  private pause = 0;

  constructor(reading: Reading) {
    this.reading = reading;
  }

  /** A line of the original that was looked at. */
  note(command: OutputSetting | PauseCommand | undefined, offset: number, originalLine: number, ours: boolean): void {
    if (!command || this.disagreement) return;
    const alike = command.what === "output" ? this.sameControl(command, offset, ours) : this.samePause(command, offset);
    if (alike) this.agreed++;
    else
      this.disagreement = {
        originalLine,
        offset,
        message: "the two readers take a command for different things, or one of them missed it",
      };
  }

  end(): void {
    const missed = this.reading.controls[this.control] ?? this.reading.pauses[this.pause];
    if (missed)
      this.disagreement ??= {
        originalLine: missed.line,
        offset: missed.offset,
        message: "one of the two readers missed a command",
      };
  }

  private sameControl({ channel, does, duty }: OutputSetting, offset: number, ours: boolean): boolean {
    const listed = this.reading.controls[this.control++];
    return (
      listed !== undefined &&
      listed.offset === offset &&
      listed.channel === channel &&
      listed.does === does &&
      (listed.ours !== false) === ours &&
      (Number.isNaN(duty) ? Number.isNaN(listed.duty) : Math.abs(listed.duty - duty) < SAME_DUTY)
    );
  }

  private samePause({ command }: PauseCommand, offset: number): boolean {
    const listed = this.reading.pauses[this.pause++];
    return listed !== undefined && listed.offset === offset && listed.command.toUpperCase() === command;
  }
}
