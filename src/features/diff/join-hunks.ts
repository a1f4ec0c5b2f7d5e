import type { DiffHunk } from "#shared/contract/tunings.ts";

/** One file's side of a diff: its text, and the number that each line has in the file. */
export interface DiffSide {
  text: string;
  /** empty where a line stands for lines that are left out */
  lineNumbers: string[];
}

/** Stands, on both sides, for lines that are the same. */
const LEFT_OUT = "…";

/** The hunks of a layer one behind the other, as one text for each file. */
export function joinHunks(hunks: readonly DiffHunk[]): { original: DiffSide; tuned: DiffSide } {
  return {
    original: join(hunks.map(({ original }) => original)),
    tuned: join(hunks.map(({ tuned }) => tuned)),
  };
}

function join(parts: readonly DiffHunk["original"][]): DiffSide {
  const lines: string[] = [];
  const lineNumbers: string[] = [];
  for (const [k, { firstLine, text }] of parts.entries()) {
    if (k > 0) {
      lines.push(LEFT_OUT);
      lineNumbers.push("");
    }
    for (const [n, line] of linesOf(text).entries()) {
      lines.push(line);
      lineNumbers.push(String(firstLine + n));
    }
  }
  return { text: lines.join("\n"), lineNumbers };
}

/** Line ends are the proof's business; here a line is a line. */
function linesOf(text: string): string[] {
  const lines = text.split(/\r\n|\r|\n/);
  if (lines[lines.length - 1] === "") lines.pop();
  return lines;
}
