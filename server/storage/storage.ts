import type { Readable } from "node:stream";

/** Bytes that are complete but not yet in their place. Plain data, so that a worker can hand it to the main thread. */
export interface Staged {
  /** name of the temporary */
  name: string;
  /** hex digest of the bytes, under which they will stand */
  sha256: string;
  bytes: number;
}

/** Bytes `start` up to and including `end`, as in an HTTP range. */
export interface ByteRange {
  start: number;
  end: number;
}

/**
 * Bytes by content. What is written is staged first and appears under its hash complete or not at all; whoever staged it
 * either keeps or discards it. Nothing that stands under a hash ever changes.
 */
export interface Storage {
  /**
   * Takes a stream to its end, hashing it on the way. When the stream fails, nothing stays.
   *
   * @param bytes its chunks must not be written over later
   * @param owner who stages, so that what a dead owner left can be removed; letters, digits and hyphens
   */
  stage(bytes: AsyncIterable<Uint8Array>, owner: string): Promise<Staged>;
  openStaged(staged: Staged): Promise<Readable>;
  /** Puts staged bytes in their place; where the same bytes stand already, these are dropped. */
  keep(staged: Staged): Promise<void>;
  discard(staged: Staged): Promise<void>;
  /** Discards whatever an owner has staged and not kept. */
  discardOf(owner: string): Promise<void>;
  /** @throws BytesMissing */
  open(sha256: string, range?: ByteRange): Promise<Readable>;
  has(sha256: string): Promise<boolean>;
  /** @throws BytesMissing */
  size(sha256: string): Promise<number>;
  /** Removing what isn't there is no error. */
  remove(sha256: string): Promise<void>;
  /** Every hash there is, in no particular order. */
  list(): AsyncIterable<string>;
}

/** A row refers to bytes that are not there: the data folder was damaged or put together from two. */
export class BytesMissing extends Error {
  override readonly name = "BytesMissing";

  constructor(sha256: string) {
    super(`no bytes are stored under ${sha256}`);
  }
}
