import { printable, sizeText } from "#server/cli/terminal.ts";

const PERIOD_MS = 100;

/** One line on the terminal, rewritten at most ten times a second; silent where standard error is no terminal. */
export class Progress {
  private readonly what: string;
  private readonly totalBytes: number | undefined;
  private shownAtMs = Number.NEGATIVE_INFINITY;

  /**
   * @param what what is being done, e.g. `reading part.gcode`
   * @param totalBytes how many bytes there will be, where that is known
   */
  constructor(what: string, totalBytes?: number) {
    this.what = printable(what);
    this.totalBytes = totalBytes;
  }

  show(bytes: number, layers?: number): void {
    if (!process.stderr.isTTY) return;
    const nowMs = performance.now();
    if (nowMs - this.shownAtMs < PERIOD_MS) return;
    this.shownAtMs = nowMs;
    const of = this.totalBytes === undefined ? "" : ` of ${sizeText(this.totalBytes)}`;
    const layersText = layers === undefined ? "" : `, ${layers} layers`;
    const line = `${this.what}: ${sizeText(bytes)}${of}${layersText}`;
    process.stderr.write(`\r\u001b[K${line.slice(0, (process.stderr.columns || 80) - 1)}`);
  }

  /** Takes the line away again. */
  end(): void {
    if (this.shownAtMs > Number.NEGATIVE_INFINITY) process.stderr.write("\r\u001b[K");
  }
}
