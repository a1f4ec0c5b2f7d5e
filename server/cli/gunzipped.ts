import { Readable } from "node:stream";
import { pipeline } from "node:stream/promises";
import { createGunzip } from "node:zlib";
import { errorCode } from "#server/cli/exit.ts";
import { Refusal } from "#shared/refusal.ts";

/** Whether a file begins as gzip does. */
export function isGzip(head: Uint8Array): boolean {
  return head.length >= 2 && head[0] === 0x1f && head[1] === 0x8b;
}

/**
 * Unpacks gzip, several members in a row included.
 *
 * @param head first chunk, already taken from the stream
 * @param rest what follows; its chunks may be overwritten once the next one is asked for
 * @throws Refusal `broken-gzip`
 */
export async function* gunzipped(
  head: Uint8Array,
  rest: AsyncIterable<Uint8Array>,
): AsyncGenerator<Uint8Array, void, undefined> {
  if (!isGzip(head)) throw broken("it does not begin as gzip does");
  const gunzip = createGunzip({ chunkSize: 64 * 1024 });
  const feeding = pipeline(Readable.from(copies(head, rest), { highWaterMark: 1 }), gunzip);
  // Its errors also end the loop below.
  feeding.catch(() => {});
  try {
    for await (const chunk of gunzip) yield chunk;
  } catch (error) {
    throw errorCode(error)?.startsWith("Z_") ? broken((error as Error).message) : error;
  } finally {
    await feeding.catch(() => {});
  }
}

/** The unpacker works on a chunk while the next one is read. */
async function* copies(head: Uint8Array, rest: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array, void, undefined> {
  yield head.slice();
  for await (const chunk of rest) yield chunk.slice();
}

function broken(why: string): Refusal {
  return new Refusal(
    "broken-gzip",
    `the gzip file is damaged: ${why}`,
    "Pack or transfer it again, or send the plain file.",
  );
}
