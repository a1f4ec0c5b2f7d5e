import type { Storage } from "#server/storage/storage.ts";

const NUMBER_BYTES = 8;

/**
 * Rows of numbers as stored bytes, little-endian doubles one after the other: any row can be read by itself, whatever
 * the size of the table. Offsets and line numbers are exact up to 2^53.
 */
export function* tableBytes(rows: Iterable<readonly number[]>): Generator<Uint8Array, void, undefined> {
  for (const row of rows) {
    const view = new DataView(new ArrayBuffer(row.length * NUMBER_BYTES));
    for (const [k, value] of row.entries()) view.setFloat64(k * NUMBER_BYTES, value, true);
    yield new Uint8Array(view.buffer);
  }
}

/**
 * @param width numbers in a row
 * @param first 0-based
 * @returns the rows [first, first + count); fewer where the table ends
 */
export async function readRows(
  storage: Storage,
  sha256: string,
  width: number,
  first: number,
  count: number,
): Promise<number[][]> {
  if (count === 0) return [];
  const start = first * width * NUMBER_BYTES;
  const pieces: Uint8Array[] = [];
  const end = start + count * width * NUMBER_BYTES - 1;
  for await (const piece of await storage.open(sha256, { start, end })) pieces.push(piece);
  const bytes = Buffer.concat(pieces);
  return Array.from({ length: bytes.length / (width * NUMBER_BYTES) }, (_, row) =>
    Array.from({ length: width }, (_, k) => bytes.readDoubleLE((row * width + k) * NUMBER_BYTES)),
  );
}
