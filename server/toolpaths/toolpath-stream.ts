import { gunzipped, isGzip } from "#server/cli/gunzipped.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import { Refusal } from "#shared/refusal.ts";

/** As much of an upload is looked at before any of it is written; a file that ends before that is read whole. */
const LOOK_BYTES = 64 * 1024;
const MEGABYTE = 2 ** 20;

/**
 * An upload on its way into the storage: gzip unpacked, bounded, and looked at, so that what is plainly no toolpath is
 * refused with the reader's own reason before it is stored.
 *
 * @param name as uploaded; `.gz` at its end says that it is packed
 * @throws Refusal
 */
export async function* toolpathStream(
  source: AsyncIterable<Uint8Array>,
  name: string,
  machine: Machine,
  maxBytes: number,
): AsyncGenerator<Uint8Array, void, undefined> {
  const pieces: Uint8Array[] = [];
  let look: Look | undefined = new Look(machine);
  let bytes = 0;
  for await (const chunk of unpacked(source, name)) {
    bytes += chunk.length;
    if (bytes > maxBytes) throw tooLarge(maxBytes);
    if (look) {
      pieces.push(chunk);
      if (look.push(chunk) < LOOK_BYTES) continue;
      look = undefined;
      yield* pieces.splice(0);
    } else yield chunk;
  }
  look?.end();
  yield* pieces;
}

/** Feeds the beginning of a file to the reader. */
class Look {
  private readonly reader: ToolpathReader;
  private bytes = 0;

  constructor(machine: Machine) {
    this.reader = new ToolpathReader(machine);
  }

  /** @returns bytes seen so far */
  push(chunk: Uint8Array): number {
    const rest = Math.max(LOOK_BYTES - this.bytes, 0);
    this.reader.push(chunk.length > rest ? chunk.subarray(0, rest) : chunk);
    this.bytes += chunk.length;
    return this.bytes;
  }

  end(): void {
    this.reader.end("");
  }
}

async function* unpacked(source: AsyncIterable<Uint8Array>, name: string): AsyncGenerator<Uint8Array, void, undefined> {
  const chunks = source[Symbol.asyncIterator]();
  const rest = { [Symbol.asyncIterator]: () => chunks };
  const head = await firstBytes(chunks);
  if (isGzip(head) || (head.length > 0 && /\.gz$/i.test(name))) yield* gunzipped(head, rest);
  else {
    if (head.length > 0) yield head;
    yield* rest;
  }
}

/** At least the two bytes that tell gzip, where there are two. */
async function firstBytes(chunks: AsyncIterator<Uint8Array>): Promise<Uint8Array> {
  let head = new Uint8Array(0);
  while (head.length < 2) {
    const { done, value } = await chunks.next();
    if (done) break;
    head = Buffer.concat([head, value]);
  }
  return head;
}

export function tooLarge(maxBytes: number): Refusal {
  return new Refusal(
    "too-large",
    `the toolpath is larger than ${maxBytes / MEGABYTE} MiB unpacked`,
    "Check that it is the right file; whoever runs this server can raise the limit.",
  );
}
