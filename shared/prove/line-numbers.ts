import type { LineLook } from "#shared/prove/line-look.ts";

/** Follows the line numbers of a numbered tuned file. */
export class LineNumbers {
  /** number of the line before; undefined before the first */
  last: number | undefined;
  /** an edit has been met: from here on every number must follow the one before */
  edited = false;
  /** how many numbered lines the edits concern, and the first one that is wrong */
  followed = 0;
  wrong: { tunedLine: number; message: string } | undefined;

  /** Whether a number is the right one, without noting it. */
  follows(number: number): boolean {
    return !this.edited || this.last === undefined || number === this.last + 1;
  }

  /** A line of the tuned file. */
  note(line: LineLook, tunedLine: number): void {
    if (!line.numbered) return;
    const { number, counterSet, checksum, computedSum } = line;
    if (checksum !== computedSum)
      this.problem(tunedLine, `its checksum is ${checksum < 0 ? "missing" : checksum}, its bytes give ${computedSum}`);
    if (counterSet >= 0) {
      this.last = counterSet;
      return;
    }
    if (!this.follows(number)) this.problem(tunedLine, `its number is ${number}, the one before is ${this.last}`);
    if (this.edited) this.followed++;
    this.last = number;
  }

  private problem(tunedLine: number, message: string): void {
    this.wrong ??= { tunedLine, message };
  }
}
