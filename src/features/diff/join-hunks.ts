import type { DiffHunk } from "#shared/contract/tunings.ts";
import { alignLines, type LinePair } from "#src/features/diff/align-lines.ts";
import { counted } from "#src/lib/format.ts";

/** One file's side of a diff: its text, and the number that each line has in the file. */
export interface DiffSide {
  text: string;
  /** empty where a line stands for lines that are left out */
  lineNumbers: string[];
}

/** Lines kept before and behind a change. */
const AROUND = 4;
/** Fewer lines than this are not worth leaving out. */
const LEAST_LEFT_OUT = 4;

/** Stands, on both sides, for lines that are the same. */
const alikeText = (count: number): string => `… ${counted(count, "line")} alike`;
export const ALIKE = /^… .* alike$/;

/** The hunks of a layer one behind the other, as one text for each file; long stretches without a change are left out. */
export function joinHunks(hunks: readonly DiffHunk[]): { original: DiffSide; tuned: DiffSide } {
  const [original, tuned] = [new Side(), new Side()];
  let endLine: number | undefined;
  for (const hunk of hunks) {
    const [before, after] = [linesOf(hunk.original.text), linesOf(hunk.tuned.text)];
    const between = endLine === undefined ? 0 : hunk.original.firstLine - endLine;
    if (between > 0) for (const side of [original, tuned]) side.leaveOut(between);
    endLine = hunk.original.firstLine + before.length;
    for (const piece of piecesOf(alignLines(before, after))) {
      if (piece.alike) for (const side of [original, tuned]) side.leaveOut(piece.pairs.length);
      else
        for (const [b, a] of piece.pairs) {
          if (b >= 0) original.add(before[b], hunk.original.firstLine + b);
          if (a >= 0) tuned.add(after[a], hunk.tuned.firstLine + a);
        }
    }
  }
  return { original: original.end(), tuned: tuned.end() };
}

class Side {
  private readonly lines: string[] = [];
  private readonly numbers: string[] = [];

  add(line: string, number: number): void {
    this.lines.push(line);
    this.numbers.push(String(number));
  }

  leaveOut(count: number): void {
    this.lines.push(alikeText(count));
    this.numbers.push("");
  }

  end(): DiffSide {
    return { text: this.lines.join("\n"), lineNumbers: this.numbers };
  }
}

/** Runs to be shown, and runs without a change near enough. Without any change all is shown. */
function piecesOf(pairs: readonly LinePair[]): { alike: boolean; pairs: LinePair[] }[] {
  const near = new Uint8Array(pairs.length);
  pairs.forEach(([before, after], n) => {
    if (before < 0 || after < 0) near.fill(1, Math.max(n - AROUND, 0), n + AROUND + 1);
  });
  if (!near.includes(1)) return [{ alike: false, pairs: [...pairs] }];
  const pieces: { alike: boolean; pairs: LinePair[] }[] = [];
  for (let from = 0; from < pairs.length; ) {
    let to = from;
    while (to < pairs.length && near[to] === near[from]) to++;
    const alike = near[from] === 0 && to - from >= LEAST_LEFT_OUT;
    pieces.push({ alike, pairs: pairs.slice(from, to) });
    from = to;
  }
  return pieces;
}

/** Line ends are the proof's business; here a line is a line. */
function linesOf(text: string): string[] {
  const lines = text.split(/\r\n|\r|\n/);
  if (lines[lines.length - 1] === "") lines.pop();
  return lines;
}
