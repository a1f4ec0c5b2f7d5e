import type { Writable } from "node:stream";

/**
 * Writes a chunk and waits until it has been dealt with, after which its buffer may be used again. A stream that is
 * destroyed meanwhile says nothing about the chunk, so its closing counts as a failure.
 */
export function writeWhole(stream: Writable, chunk: Uint8Array): Promise<void> {
  return new Promise((resolve, reject) => {
    const onClose = () => reject(new Error("the stream was closed"));
    stream.once("close", onClose);
    stream.write(chunk, (error) => {
      stream.off("close", onClose);
      if (error) reject(error);
      else resolve();
    });
  });
}
