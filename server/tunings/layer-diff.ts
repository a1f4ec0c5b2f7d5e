import { notFound } from "#server/http/app-error.ts";
import { readRows } from "#server/storage/number-table.ts";
import { readStored, textOf } from "#server/storage/read-stored.ts";
import type { Storage } from "#server/storage/storage.ts";
import { MOST_TEXT_BYTES, wholeLines } from "#server/toolpaths/layer-lines.ts";
import { LineStarts } from "#server/toolpaths/line-starts.ts";
import { type DoneTuning, tunedBytesOf } from "#server/tunings/service.ts";
import {
  EDIT_WIDTH,
  editOfRow,
  LAYER_WIDTH,
  layerOfRow,
  type Place,
  type PlacedEdit,
  type PlacedLayer,
} from "#server/tunings/tuned-places.ts";

export interface Lines {
  firstLine: number;
  text: string;
}

export interface LayerDiff {
  original: Lines;
  tuned: Lines;
  /** the layer is longer than what is sent: a stretch around its first change */
  truncated: boolean;
}

/** Unchanged lines sent before the first change of a layer that is too long to be sent whole. */
const LINES_BEFORE = 20;
const BYTES_BEFORE = 4_096;
/** Our own lines and renumbering make the tuned side a little longer than the original one. */
const ROOM = 1.5;
/** Edits of a layer that are looked at; a stretch of text holds no more. */
const MOST_EDITS = 20_000;

/**
 * Both sides of one layer, from its write position to the next layer's; of the last layer, to the files' ends. Both
 * sides begin and end at lines that correspond.
 *
 * @param index 1-based
 * @throws AppError `not-found`, `proof-failed`
 */
export async function layerDiff(storage: Storage, row: DoneTuning, index: number): Promise<LayerDiff> {
  const tunedSha256 = tunedBytesOf(row);
  const rows = await readRows(storage, row.files.placesSha256, LAYER_WIDTH, index - 1, 2);
  if (rows.length < 2) throw notFound("layer");
  const [layer, next] = rows.map(layerOfRow);
  const sides = { original: row.toolpath.sha256, tuned: tunedSha256 };
  if (next.offset - layer.offset <= MOST_TEXT_BYTES && next.tunedOffset - layer.tunedOffset <= ROOM * MOST_TEXT_BYTES)
    return { ...(await between(storage, sides, layer, next)), truncated: false };
  const count = Math.min(next.firstEdit - layer.firstEdit, MOST_EDITS);
  const edits = (await readRows(storage, row.files.editsSha256, EDIT_WIDTH, layer.firstEdit, count)).map(editOfRow);
  return { ...(await stretch(storage, sides, layer, next, edits)), truncated: true };
}

interface Sides {
  original: string;
  tuned: string;
}

async function between(storage: Storage, sides: Sides, from: Place, to: Place): Promise<Omit<LayerDiff, "truncated">> {
  const original = await readStored(storage, sides.original, { start: from.offset, end: to.offset - 1 });
  const tuned = await readStored(storage, sides.tuned, { start: from.tunedOffset, end: to.tunedOffset - 1 });
  return {
    original: { firstLine: from.line, text: textOf(original) },
    tuned: { firstLine: from.tunedLine, text: textOf(tuned) },
  };
}

/** As many lines as fit, from a little before the layer's first change on. */
async function stretch(
  storage: Storage,
  sides: Sides,
  layer: PlacedLayer,
  next: Place,
  edits: readonly PlacedEdit[],
): Promise<Omit<LayerDiff, "truncated">> {
  const from = await before(storage, sides, layer, edits[0]);
  const end = Math.min(next.offset, from.offset + MOST_TEXT_BYTES) - 1;
  const original = wholeLines(await readStored(storage, sides.original, { start: from.offset, end }));
  // No edit may be cut in two: what it takes out and puts in is shown whole or not at all.
  const endLine = from.line + lineCount(original);
  const cut = edits.find(({ line, removedLines }) => line < endLine && line + removedLines > endLine);
  const lastLine = cut ? cut.line : endLine;
  const last = edits.filter(({ line, removedLines }) => line + removedLines <= lastLine && line < lastLine).at(-1);
  const grown = last ? last.tunedLine + last.insertedLines - last.line - last.removedLines : from.tunedLine - from.line;
  const tunedEnd = Math.min(next.tunedOffset, from.tunedOffset + ROOM * MOST_TEXT_BYTES) - 1;
  const tuned = await readStored(storage, sides.tuned, { start: from.tunedOffset, end: tunedEnd });
  return {
    original: { firstLine: from.line, text: textOf(firstLines(original, lastLine - from.line)) },
    tuned: { firstLine: from.tunedLine, text: textOf(firstLines(tuned, lastLine + grown - from.tunedLine)) },
  };
}

/** A place some unchanged lines before the first edit, but inside the layer. */
async function before(storage: Storage, sides: Sides, layer: PlacedLayer, edit?: PlacedEdit): Promise<Place> {
  if (!edit) return layer;
  const lines = Math.min(edit.line - layer.line, LINES_BEFORE);
  if (lines === 0) return layer;
  const [offset, tunedOffset] = await Promise.all([
    back(storage, sides.original, layer.offset, edit.offset, lines),
    back(storage, sides.tuned, layer.tunedOffset, edit.tunedOffset, lines),
  ]);
  // Lines too long to be looked back over: begin at the edit itself.
  if (offset === undefined || tunedOffset === undefined) return edit;
  return { offset, line: edit.line - lines, tunedOffset, tunedLine: edit.tunedLine - lines };
}

/** Byte at which the line stands that is so many lines before the one at `end`. */
async function back(
  storage: Storage,
  sha256: string,
  from: number,
  end: number,
  lines: number,
): Promise<number | undefined> {
  const start = Math.max(from, end - BYTES_BEFORE);
  const starts = start === from ? [start] : [];
  const finder = new LineStarts((offset) => starts.push(start + offset));
  finder.push(await readStored(storage, sha256, { start, end: end - 1 }));
  finder.end();
  // The last start is that of the line at `end`.
  return starts.at(-1 - lines);
}

function lineCount(bytes: Uint8Array): number {
  const starts = new LineStarts(() => {});
  starts.push(bytes);
  starts.end();
  return starts.line - 1;
}

function firstLines(bytes: Buffer, count: number): Buffer {
  let end = bytes.length;
  const starts = new LineStarts((offset, line) => {
    if (line === count + 1) end = offset;
  });
  starts.push(bytes);
  starts.end();
  return bytes.subarray(0, count === 0 ? 0 : end);
}
