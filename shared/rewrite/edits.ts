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
   * @param bytes length of the file, and whether its last line is terminated: what goes in behind an unterminated line
   * gets its terminator in front
   */
  end(newline: string, { bytes, finalNewline }: { bytes: number; finalNewline: boolean }): Edit[] {
    const offsets = [...new Set([...this.removals.keys(), ...this.insertions.keys()])].sort((a, b) => a - b);
    const lastRemoved =
      !finalNewline &&
      offsets.some((offset) => offset + (this.removals.get(offset) ?? 0) === bytes && this.removals.has(offset));
    const edits = offsets.map((offset): Edit => {
      const lines = this.insertions.get(offset) ?? [];
      return { offset, remove: this.removals.get(offset) ?? 0, insert: lines.map((line) => line + newline).join("") };
    });
    if (finalNewline) return edits;
    return lastRemoved ? withoutLastNewline(edits, newline, bytes) : atOpenEnd(edits, newline, bytes);
  }
}

/** Insertions at the end of a file without a final terminator: the terminator goes in front. */
function atOpenEnd(edits: Edit[], newline: string, bytes: number): Edit[] {
  return edits.map((edit) =>
    edit.offset === bytes && edit.insert !== ""
      ? { ...edit, insert: newline + edit.insert.slice(0, -newline.length) }
      : edit,
  );
}

/**
 * Our own lines stood at the very end, unterminated: the terminator before them came with them and goes with them. What
 * is put in their place gets one in front again.
 */
function withoutLastNewline(edits: Edit[], newline: string, bytes: number): Edit[] {
  let first = edits.length - 1;
  while (
    first > 0 &&
    edits[first - 1].remove > 0 &&
    edits[first - 1].offset + edits[first - 1].remove === edits[first].offset
  )
    first--;
  const insert = edits
    .slice(first)
    .map((edit) => edit.insert)
    .join("");
  const offset = edits[first].offset - newline.length;
  const last: Edit = {
    offset,
    remove: bytes - offset,
    insert: insert === "" ? "" : newline + insert.slice(0, -newline.length),
  };
  return [...edits.slice(0, first), last];
}
