import { notFound } from "#server/http/app-error.ts";
import { readRows } from "#server/storage/number-table.ts";
import { readStored, textOf } from "#server/storage/read-stored.ts";
import type { Storage } from "#server/storage/storage.ts";
import { MOST_TEXT_BYTES } from "#server/toolpaths/layer-lines.ts";
import { hunkAround, hunksOf, type Sides } from "#server/tunings/diff-hunks.ts";
import { type DoneTuning, tunedBytesOf } from "#server/tunings/service.ts";
import { EDIT_WIDTH, editOfRow, LAYER_WIDTH, layerOfRow, type Place } from "#server/tunings/tuned-places.ts";
import type { DiffHunk, LayerDiff } from "#shared/contract/tunings.ts";

/** Our own lines and renumbering make the tuned side a little longer than the original one. */
const ROOM = 1.5;
/** Edits of a layer that are looked at; no more could be sent. */
const MOST_EDITS = 20_000;

/**
 * Both sides of one layer, from its write position to the next layer's; of the last layer, to the files' ends. Both
 * sides of a hunk begin and end at lines that correspond.
 *
 * @param index 1-based
 * @throws AppError `not-found`, `proof-failed`
 */
export async function layerDiff(storage: Storage, row: DoneTuning, index: number): Promise<LayerDiff> {
  const sides = { original: row.toolpath.sha256, tuned: tunedBytesOf(row) };
  const rows = await readRows(storage, row.files.placesSha256, LAYER_WIDTH, index - 1, 2);
  if (rows.length < 2) throw notFound("layer");
  const [layer, next] = rows.map(layerOfRow);
  if (next.offset - layer.offset <= MOST_TEXT_BYTES && next.tunedOffset - layer.tunedOffset <= ROOM * MOST_TEXT_BYTES)
    return { hunks: [await between(storage, sides, layer, next)], shows: "layer" };
  const count = Math.min(next.firstEdit - layer.firstEdit, MOST_EDITS);
  const edits = (await readRows(storage, row.files.editsSha256, EDIT_WIDTH, layer.firstEdit, count)).map(editOfRow);
  if (edits.length > 0) return hunksOf(storage, sides, edits, layer, next);
  const beginning = { ...layer, removedLines: 0, insertedLines: 0 };
  return { hunks: [await hunkAround(storage, sides, [beginning], layer, next)], shows: "changes" };
}

async function between(storage: Storage, sides: Sides, from: Place, to: Place): Promise<DiffHunk> {
  const original = await readStored(storage, sides.original, { start: from.offset, end: to.offset - 1 });
  const tuned = await readStored(storage, sides.tuned, { start: from.tunedOffset, end: to.tunedOffset - 1 });
  return {
    original: { firstLine: from.line, text: textOf(original) },
    tuned: { firstLine: from.tunedLine, text: textOf(tuned) },
  };
}
