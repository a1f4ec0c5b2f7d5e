import type { ByteRange, Storage } from "#server/storage/storage.ts";

/** Bytes as text: what is not UTF-8 shows as replacement characters, and nothing is left out. */
const decoder = new TextDecoder("utf-8", { ignoreBOM: true });

export async function readStored(storage: Storage, sha256: string, range: ByteRange): Promise<Buffer> {
  if (range.end < range.start) return Buffer.alloc(0);
  const pieces: Uint8Array[] = [];
  for await (const piece of await storage.open(sha256, range)) pieces.push(piece);
  return Buffer.concat(pieces);
}

export const textOf = (bytes: Uint8Array): string => decoder.decode(bytes);
