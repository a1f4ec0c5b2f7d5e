const LF = 10;
const CR = 13;

/**
 * Finds where lines start in a stream of bytes cut anywhere. Lines end with LF, CR LF or CR, as everywhere else.
 */
export class LineStarts {
  /** number of the line that the next byte belongs to, 1-based */
  line = 1;
  bytes = 0;
  private afterCr = false;
  private readonly onStart: (offset: number, line: number) => void;

  /** @param onStart told of every line but the first; the line behind a last terminator counts, though it holds nothing */
  constructor(onStart: (offset: number, line: number) => void) {
    this.onStart = onStart;
  }

  push(chunk: Uint8Array): void {
    const { bytes, onStart } = this;
    let { line, afterCr } = this;
    for (let p = 0; p < chunk.length; p++) {
      const byte = chunk[p];
      if (afterCr) {
        afterCr = false;
        if (byte !== LF) onStart(bytes + p, ++line);
      }
      if (byte > CR) continue;
      if (byte === LF) onStart(bytes + p + 1, ++line);
      else if (byte === CR) afterCr = true;
    }
    this.line = line;
    this.afterCr = afterCr;
    this.bytes += chunk.length;
  }

  end(): void {
    if (this.afterCr) this.onStart(this.bytes, ++this.line);
    this.afterCr = false;
  }
}

/** Numbers of the lines that hold given bytes. */
export class LinesOfOffsets {
  readonly lines: number[] = [];
  private readonly offsets: readonly number[];
  private readonly starts = new LineStarts((offset, line) => this.fillUpTo(offset, line - 1));

  /** @param offsets ascending; the file's size counts as the end of its last line */
  constructor(offsets: readonly number[]) {
    this.offsets = offsets;
  }

  push(chunk: Uint8Array): void {
    this.starts.push(chunk);
  }

  end(): number[] {
    this.starts.end();
    this.fillUpTo(Number.POSITIVE_INFINITY, this.starts.line);
    return this.lines;
  }

  private fillUpTo(offset: number, line: number): void {
    while (this.lines.length < this.offsets.length && this.offsets[this.lines.length] < offset) this.lines.push(line);
  }
}

/** Bytes at which given lines start. */
export class OffsetsOfLines {
  readonly offsets: number[] = [];
  private readonly wanted: readonly number[];
  private readonly starts = new LineStarts((offset, line) => this.fillUpTo(line, offset));

  /** @param wanted ascending; a line beyond the last one starts at the file's end */
  constructor(wanted: readonly number[]) {
    this.wanted = wanted;
    this.fillUpTo(1, 0);
  }

  push(chunk: Uint8Array): void {
    this.starts.push(chunk);
  }

  end(): number[] {
    this.starts.end();
    this.fillUpTo(Number.POSITIVE_INFINITY, this.starts.bytes);
    return this.offsets;
  }

  private fillUpTo(line: number, offset: number): void {
    while (this.offsets.length < this.wanted.length && this.wanted[this.offsets.length] <= line)
      this.offsets.push(offset);
  }
}
