import { createGunzip, type Gunzip } from "node:zlib";
import { errorCode } from "#server/cli/exit.ts";
import { writeWhole } from "#server/cli/write-whole.ts";
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
  const feeding = feed(gunzip, head, rest);
  try {
    for await (const chunk of gunzip) yield chunk;
  } catch (error) {
    throw errorCode(error)?.startsWith("Z_") ? broken((error as Error).message) : error;
  } finally {
    await feeding;
  }
}

/** Never throws: what goes wrong ends the stream for its reader, and a reader that has left ends the feeding. */
async function feed(gunzip: Gunzip, head: Uint8Array, rest: AsyncIterable<Uint8Array>): Promise<void> {
  try {
    await writeWhole(gunzip, head);
    for await (const chunk of rest) await writeWhole(gunzip, chunk);
    gunzip.end();
  } catch (error) {
    gunzip.destroy(error as Error);
  }
}

function broken(why: string): Refusal {
  return new Refusal(
    "broken-gzip",
    `the gzip file is damaged: ${why}`,
    "Pack or transfer it again, or send the plain file.",
  );
}
