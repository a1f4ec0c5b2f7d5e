/** One place where the tuned file differs: bytes taken out, text put in. */
export interface Edit {
  /** byte of the untuned file at which the text goes in and from which bytes are taken out */
  offset: number;
  remove: number;
  /** whole lines with their terminators; number and checksum are added while writing where the file has them */
  insert: string;
}

/** Collects removals and insertions in any order and merges them by place; what is inserted at one place keeps its order. */
export class EditList {
  private readonly removals = new Map<number, number>();
  private readonly insertions = new Map<number, string[]>();

  remove(offset: number, length: number): void {
    this.removals.set(offset, length);
  }

  insert(offset: number, line: string): void {
    const lines = this.insertions.get(offset);
    if (lines) lines.push(line);
    else this.insertions.set(offset, [line]);
  }

  /**
   * @param newline terminator of the file
   * @param bytes length of the file, and whether its last line is terminated: where it is not, a terminator stands
   * before the lines at the end instead of behind them
   */
  end(newline: string, { bytes, finalNewline }: { bytes: number; finalNewline: boolean }): Edit[] {
    const edits = this.merged(newline);
    const last = edits[edits.length - 1];
    if (finalNewline || !last || last.offset + last.remove < bytes) return edits;
    if (last.remove > 0) {
      // Our own lines of an earlier tuning stood at the end: the terminator before them came with them.
      last.offset -= newline.length;
      last.remove += newline.length;
    }
    if (last.insert !== "") last.insert = newline + last.insert.slice(0, -newline.length);
    return edits;
  }

  /** Ascending; what is taken out in one piece is one edit. */
  private merged(newline: string): Edit[] {
    const offsets = [...new Set([...this.removals.keys(), ...this.insertions.keys()])].sort((a, b) => a - b);
    const edits: Edit[] = [];
    for (const offset of offsets) {
      const remove = this.removals.get(offset) ?? 0;
      const insert = (this.insertions.get(offset) ?? []).map((line) => line + newline).join("");
      const before = edits[edits.length - 1];
      if (before && before.offset + before.remove === offset) {
        before.remove += remove;
        before.insert += insert;
      } else edits.push({ offset, remove, insert });
    }
    return edits;
  }
}
