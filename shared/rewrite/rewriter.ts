import type { FileFacts } from "#shared/layers/reading.ts";
import type { Edit } from "#shared/rewrite/edits.ts";
import { Renumberer } from "#shared/rewrite/renumberer.ts";

/** Size of the pieces handed on. */
const BLOCK_BYTES = 1 << 18;

/**
 * The second pass: copies the file with its edits. What lies between two edits is copied as it stands; nothing is
 * parsed, except in numbered files, where every line from the first edit on gets a new number and checksum.
 */
export class Rewriter {
  private readonly edits: readonly Edit[];
  private readonly sink: { write(bytes: Uint8Array): void; text(line: string): void; end(): void };
  private offset = 0;
  private next = 0;
  private skip = 0;

  /**
   * @param edits ascending by offset, not overlapping
   * @param emit takes each piece of the tuned file; the buffer is used again after it returns
   */
  constructor(edits: readonly Edit[], file: Pick<FileFacts, "numbered">, emit: (bytes: Uint8Array) => void) {
    this.edits = edits;
    const blocks = new Blocks(emit);
    this.sink = file.numbered ? new Renumberer(blocks, edits[0]?.offset ?? Number.POSITIVE_INFINITY) : blocks;
  }

  push(chunk: Uint8Array): void {
    let from = 0;
    while (from < chunk.length) {
      if (this.skip > 0) {
        const skipped = Math.min(this.skip, chunk.length - from);
        this.skip -= skipped;
        this.offset += skipped;
        from += skipped;
        continue;
      }
      const edit = this.edits[this.next];
      const until = edit ? Math.min(from + edit.offset - this.offset, chunk.length) : chunk.length;
      if (until > from) {
        this.sink.write(chunk.subarray(from, until));
        this.offset += until - from;
        from = until;
      }
      if (edit && this.offset === edit.offset) this.apply(edit);
    }
  }

  end(): void {
    while (this.next < this.edits.length) this.apply(this.edits[this.next]);
    this.sink.end();
  }

  private apply(edit: Edit): void {
    if (edit.insert !== "") this.sink.text(edit.insert);
    this.skip = edit.remove;
    this.next++;
  }
}

/** Gathers pieces into blocks: handing on each small piece costs twice as much. */
export class Blocks {
  private readonly emit: (bytes: Uint8Array) => void;
  private readonly block = new Uint8Array(BLOCK_BYTES);
  private filled = 0;

  constructor(emit: (bytes: Uint8Array) => void) {
    this.emit = emit;
  }

  write(bytes: Uint8Array): void {
    if (bytes.length >= BLOCK_BYTES) {
      this.flush();
      this.emit(bytes);
      return;
    }
    if (this.filled + bytes.length > BLOCK_BYTES) this.flush();
    this.block.set(bytes, this.filled);
    this.filled += bytes.length;
  }

  /** Our own text is ASCII. */
  text(text: string): void {
    this.write(Uint8Array.from(text, (c) => c.charCodeAt(0)));
  }

  end(): void {
    this.flush();
  }

  private flush(): void {
    if (this.filled > 0) this.emit(this.block.subarray(0, this.filled));
    this.filled = 0;
  }
}
