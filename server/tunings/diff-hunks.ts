import { readStored, textOf } from "#server/storage/read-stored.ts";
import type { Storage } from "#server/storage/storage.ts";
import { MOST_TEXT_BYTES } from "#server/toolpaths/layer-lines.ts";
import { LineStarts } from "#server/toolpaths/line-starts.ts";
import type { Place, PlacedEdit, PlacedLayer } from "#server/tunings/tuned-places.ts";
import type { DiffHunk, LayerDiff } from "#shared/contract/tunings.ts";

/** Digests of both files. */
export interface Sides {
  original: string;
  tuned: string;
}

/** Unchanged lines before and behind a change. */
const CONTEXT_LINES = 4;
/** Hunks of one reply: each is read from both files by itself. */
const MOST_HUNKS = 500;
/** Read around a hunk at first, and at most where lines are so long that this does not hold them. */
const FIRST_ROOM_BYTES = 2_048;
const MOST_ROOM_BYTES = 131_072;

/**
 * The edits of a layer with the lines around them, as many as are sent at once. Edits that stand close together share a
 * hunk.
 *
 * @param edits of the layer from its first one on, ascending
 * @param next where the layer behind it begins
 */
export async function hunksOf(
  storage: Storage,
  sides: Sides,
  edits: readonly PlacedEdit[],
  layer: PlacedLayer,
  next: PlacedLayer,
): Promise<LayerDiff> {
  const hunks: DiffHunk[] = [];
  let roomBytes = MOST_TEXT_BYTES;
  let done = 0;
  while (done < edits.length && hunks.length < MOST_HUNKS && roomBytes > 0) {
    const end = endOfHunk(edits, done, roomBytes);
    const hunk = await hunkAround(storage, sides, edits.slice(done, end), layer, next, edits[end]?.line);
    hunks.push(hunk);
    roomBytes -= hunk.original.text.length;
    done = end;
  }
  return { hunks, shows: done === next.firstEdit - layer.firstEdit ? "changes" : "first-changes" };
}

/** Index behind the last edit that belongs into the hunk of this one. */
function endOfHunk(edits: readonly PlacedEdit[], first: number, roomBytes: number): number {
  let end = first + 1;
  while (end < edits.length) {
    const { line, removedLines } = edits[end - 1];
    if (edits[end].line - line - removedLines > 2 * CONTEXT_LINES) break;
    if (edits[end].offset - edits[first].offset > roomBytes) break;
    end++;
  }
  return end;
}

/**
 * Both files from a few lines before the first of these edits to a few behind the last, but inside the layer.
 *
 * @param beforeLine line of the original at which something else begins
 */
export async function hunkAround(
  storage: Storage,
  sides: Sides,
  edits: readonly PlacedEdit[],
  layer: Place,
  next: Place,
  beforeLine = Number.POSITIVE_INFINITY,
): Promise<DiffHunk> {
  const [first, last] = [edits[0], edits[edits.length - 1]];
  for (let room = FIRST_ROOM_BYTES; ; room *= 4) {
    const [original, tuned] = await Promise.all([
      Lines.read(storage, sides.original, [layer.offset, first.offset, last.offset, next.offset], room),
      Lines.read(
        storage,
        sides.tuned,
        [layer.tunedOffset, first.tunedOffset, last.tunedOffset, next.tunedOffset],
        room,
      ),
    ]);
    const from = [original.holding(first.offset), tuned.holding(first.tunedOffset)];
    const to = [
      original.holding(last.offset) + last.removedLines,
      tuned.holding(last.tunedOffset) + last.insertedLines,
    ];
    const behind = Math.min(original.count - to[0], tuned.count - to[1]);
    if (behind < CONTEXT_LINES && room < MOST_ROOM_BYTES && !(original.toEnd && tuned.toEnd)) continue;
    const before = Math.min(CONTEXT_LINES, ...from);
    const after = Math.max(0, Math.min(CONTEXT_LINES, behind, beforeLine - last.line - last.removedLines));
    // What is put in behind a last line without an end makes it end: there, lines are not counted alike.
    const atEnd = original.toEnd && tuned.toEnd && behind <= CONTEXT_LINES && beforeLine === Number.POSITIVE_INFINITY;
    return {
      original: {
        firstLine: first.line - before,
        text: original.text(from[0] - before, atEnd ? original.count : to[0] + after),
      },
      tuned: {
        firstLine: first.tunedLine - before,
        text: tuned.text(from[1] - before, atEnd ? tuned.count : to[1] + after),
      },
    };
  }
}

/** Whole lines of a file around a stretch of it. */
class Lines {
  /** the layer ends with the last of them */
  readonly toEnd: boolean;
  private readonly bytes: Buffer;
  private readonly start: number;
  /** bytes of the file at which lines begin; last, where the last one ends */
  private readonly borders: number[];

  private constructor(bytes: Buffer, start: number, borders: number[], toEnd: boolean) {
    this.bytes = bytes;
    this.start = start;
    this.borders = borders;
    this.toEnd = toEnd;
  }

  /** @param room bytes read before and behind the stretch [from, to], but not beyond [low, high] */
  static async read(
    storage: Storage,
    sha256: string,
    [low, from, to, high]: [number, number, number, number],
    room: number,
  ): Promise<Lines> {
    const start = Math.max(low, from - room);
    const end = Math.min(high, to + room);
    const bytes = await readStored(storage, sha256, { start, end: end - 1 });
    const borders = start === low ? [start] : [];
    const starts = new LineStarts((offset) => borders.push(start + offset));
    starts.push(bytes);
    // Elsewhere a CR that stands last may be half of a CR LF.
    if (end === high) starts.end();
    if (end === high && borders[borders.length - 1] !== high) borders.push(high);
    return new Lines(bytes, start, borders, end === high);
  }

  get count(): number {
    return Math.max(0, this.borders.length - 1);
  }

  /** Index of the line that holds a byte, or begins at it. */
  holding(offset: number): number {
    let index = this.borders.length - 1;
    while (index > 0 && this.borders[index] > offset) index--;
    return Math.max(0, index);
  }

  /** @param from index of the first line; to: index behind the last one */
  text(from: number, to: number): string {
    const border = (index: number): number => this.borders[Math.min(index, this.borders.length - 1)] - this.start;
    return this.borders.length === 0 ? "" : textOf(this.bytes.subarray(border(from), border(to)));
  }
}
