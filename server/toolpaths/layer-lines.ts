import { notFound } from "#server/http/app-error.ts";
import { readRows } from "#server/storage/number-table.ts";
import { readStored, textOf } from "#server/storage/read-stored.ts";
import type { Storage } from "#server/storage/storage.ts";
import type { DoneReading } from "#server/toolpaths/service.ts";
import type { LayerLines } from "#shared/contract/toolpaths.ts";

/** As much of a layer is sent at once; a diff of more takes a browser seconds. */
export const MOST_TEXT_BYTES = 200_000;
const PLACE_WIDTH = 2;

/**
 * Lines of a layer as they stand in the file, from its write position to the next layer's; of the last layer, to the
 * file's end.
 *
 * @param layer 1-based
 * @throws AppError `not-found`
 */
export async function layerLines(storage: Storage, row: DoneReading, layer: number): Promise<LayerLines> {
  const rows = await readRows(storage, row.files.placesSha256, PLACE_WIDTH, layer - 1, 2);
  if (rows.length < 2) throw notFound("layer");
  const [[start, firstLine], [end]] = rows;
  const truncated = end - start > MOST_TEXT_BYTES;
  const last = Math.min(end, start + MOST_TEXT_BYTES) - 1;
  const bytes = await readStored(storage, row.toolpath.sha256, { start, end: last });
  return { firstLine, text: textOf(truncated ? wholeLines(bytes) : bytes), truncated };
}

/** Leaves the broken last line out; a single line that is too long is cut. */
export function wholeLines(bytes: Buffer): Buffer {
  // The last byte may be the first half of a CR LF, so it doesn't count.
  const end = Math.max(bytes.lastIndexOf(10, -2), bytes.lastIndexOf(13, -2)) + 1;
  return end > 0 ? bytes.subarray(0, end) : bytes;
}
