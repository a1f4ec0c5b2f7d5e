import { isProvenance, type OwnTag, ownTag } from "#shared/gcode/own-lines.ts";
import { LineKind } from "#shared/gcode/scan-line.ts";
import type { LineLook } from "#shared/prove/line-look.ts";

/** Which of our lines a line is: the provenance line, or a command with one of our tags behind it. */
export function ownKind(line: LineLook): "provenance" | OwnTag | undefined {
  const { kind, commentStart, commentEnd } = line.scan;
  if (commentStart < 0) return undefined;
  if (kind === LineKind.blank) return isProvenance(line.buf, commentStart, commentEnd) ? "provenance" : undefined;
  return ownTag(line.buf, commentStart, commentEnd) || undefined;
}

/**
 * What is wrong with how a command of ours is written, apart from the command itself: `[N…␠]command[*…]␠;tag`, with
 * number and checksum in numbered files and in no others.
 */
export function ownFormProblem(line: LineLook, numbered: boolean): string | undefined {
  const text = line.text(line.start, line.textEnd);
  if (!/^(N\d+ )?[\x21-\x29\x2b-\x3a\x3c-\x7e]+( [\x21-\x29\x2b-\x3a\x3c-\x7e]+)*(\*\d+)? ;ql[+=]?$/.test(text))
    return "it has a blank, a word or a sign that no line of ours has";
  if (numbered && !line.numbered) return "it lacks number and checksum in a numbered file";
  if (!numbered && line.numberStart >= 0) return "it has a number in a file without";
  return undefined;
}
