import { deserialize, serialize } from "node:v8";
import { gunzipSync, gzipSync } from "node:zlib";
import type { Reading } from "#shared/layers/reading.ts";

/** A reading changes with the engine that made it, and only the engine that made it may build on it. */
interface Kept {
  engine: string;
  reading: Reading;
}

/** The whole reading, so that a tuning need not parse the file again. Only a worker packs and unpacks it. */
export function packReading(reading: Reading, engine: string): Uint8Array {
  const kept: Kept = { engine, reading };
  return gzipSync(serialize(kept), { level: 1 });
}

/** @returns undefined when another version of the engine made it */
export function unpackReading(bytes: Uint8Array, engine: string): Reading | undefined {
  const kept = deserialize(gunzipSync(bytes)) as Kept;
  return kept.engine === engine ? kept.reading : undefined;
}
