import type { Machine } from "#shared/formats/machine.ts";
import { hostChecksum } from "#shared/gcode/host-checksum.ts";
import { LineFeeder } from "#shared/gcode/line-feeder.ts";
import { CommentReader, type CommentShape } from "#shared/gcode/markers.ts";
import { isProvenance, ownTag, PROVENANCE_PREFIX } from "#shared/gcode/own-lines.ts";
import { LineKind, LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import { refuseForeign } from "#shared/gcode/sniff.ts";
import { Findings } from "#shared/layers/findings.ts";
import { finishReading } from "#shared/layers/finish-reading.ts";
import { LayerBuilder } from "#shared/layers/layer-builder.ts";
import { namedLimits, namedTemperatures } from "#shared/layers/named-settings.ts";
import { OutputLines } from "#shared/layers/output-lines.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { Interpreter } from "#shared/machine/interpreter.ts";
import { parseNamed } from "#shared/machine/output-command.ts";
import { Refusal } from "#shared/refusal.ts";

const M_BIT = 1 << 12;
const N_BIT = 1 << 13;
const EQUALS = 61;
const CR = 13;
const HEAD_BYTES = 512;
/** Longest text of a named command that is looked at. */
const NAMED_BYTES = 2048;

const BOM = [0xef, 0xbb, 0xbf];

export interface ReadOptions {
  /** comment shapes of the team's own, tried before the built-in ones */
  markers?: readonly CommentShape[];
}

/**
 * Reads a toolpath in one streaming pass: bytes in, layers with their times out. Survives any bytes; what it can't
 * read is a finding, what it can't accept is a Refusal.
 *
 *     const reader = new ToolpathReader(machine);
 *     for await (const chunk of file) reader.push(chunk);
 *     const reading = reader.end(sha256);
 */
export class ToolpathReader {
  private readonly machine: Machine;
  private readonly findings = new Findings();
  private readonly builder: LayerBuilder;
  private readonly interpreter: Interpreter;
  private readonly outputs: OutputLines;
  private readonly comments: CommentReader;
  private readonly feeder = new LineFeeder((buf, from, to, fileOffset, open) =>
    this.lines(buf, from, to, fileOffset, open),
  );
  private readonly scan = new LineScan();
  private cr = 0;
  private numbered = false;
  private lastNumber = -1;
  private provenance: Reading["provenance"];
  private head: Uint8Array | undefined = new Uint8Array(0);

  constructor(machine: Machine, options: ReadOptions = {}) {
    this.machine = machine;
    this.builder = new LayerBuilder(machine, this.findings, this.scan);
    this.interpreter = new Interpreter(machine, this.builder);
    this.outputs = new OutputLines(machine, this.findings, this.builder);
    this.comments = new CommentReader(options.markers);
  }

  /** bytes and layers so far, for progress */
  get progress(): { bytes: number; layers: number } {
    return { bytes: this.feeder.bytes, layers: this.builder.layers.length };
  }

  /**
   * @param chunk the next bytes of the file, cut anywhere
   * @throws Refusal when the file is not text G-code, or a numbered line's checksum is wrong
   */
  push(chunk: Uint8Array): void {
    if (!this.head) {
      this.feeder.push(chunk);
      return;
    }
    const held = new Uint8Array(this.head.length + chunk.length);
    held.set(this.head);
    held.set(chunk, this.head.length);
    this.head = held;
    if (held.length >= HEAD_BYTES) this.start();
  }

  /**
   * @param sha256 hex digest of all bytes, computed by whoever streamed them
   * @throws Refusal when nothing was read that could be printed
   */
  end(sha256: string): Reading {
    this.start();
    const finalNewline = this.feeder.end();
    const { bytes } = this.feeder;
    if (bytes === 0)
      throw new Refusal("empty", "the file is empty", "Export the toolpath again and check that the disk is not full.");
    this.builder.end();
    return finishReading({
      machine: this.machine,
      builder: this.builder,
      outputs: this.outputs,
      findings: this.findings,
      provenance: this.provenance,
      file: {
        bytes,
        lines: this.scan.line,
        sha256,
        newline: this.newline(finalNewline),
        numbered: this.numbered,
        finalNewline,
      },
    });
  }

  /** The first bytes tell what kind of file this is; a byte order mark is no part of the first line. */
  private start(): void {
    const { head } = this;
    if (!head) return;
    this.head = undefined;
    refuseForeign(
      BOM.every((byte, k) => head[k] === byte) ? head.subarray(3, HEAD_BYTES) : head.subarray(0, HEAD_BYTES),
    );
    this.feeder.push(head);
  }

  private newline(finalNewline: boolean): Reading["file"]["newline"] {
    const { cr } = this;
    const { crlf } = this.scan;
    const lf = this.scan.line - crlf - cr - (finalNewline ? 0 : 1);
    const kinds = [lf > 0, crlf > 0, cr > 0].filter(Boolean).length;
    if (kinds === 0) return "none";
    if (kinds > 1) return "mixed";
    return lf > 0 ? "lf" : crlf > 0 ? "crlf" : "cr";
  }

  private lines(buf: Uint8Array, from: number, to: number, fileOffset: number, open: boolean): void {
    this.builder.base = fileOffset - from;
    this.builder.openEnd = open;
    let p = from;
    if (fileOffset === 0 && BOM.every((byte, k) => buf[from + k] === byte)) p += 3;
    while (p < to) p = this.oneLine(buf, p);
    this.builder.endBlock();
  }

  private oneLine(buf: Uint8Array, start: number): number {
    const { scan } = this;
    const next = scanLine(buf, start, scan);
    scan.line++;
    if (scan.plain) this.interpreter.run(scan);
    else this.otherLine(buf, start);
    return next;
  }

  private otherLine(buf: Uint8Array, start: number): void {
    const { scan } = this;
    if (buf[scan.textEnd] === CR && scan.next - scan.textEnd === 1) this.cr++;
    if (scan.starAt >= 0) this.checkSum(buf, start);
    if ((scan.mask & N_BIT) !== 0) this.lineNumber();
    switch (scan.kind) {
      case LineKind.blank:
        if (scan.commentStart >= 0) this.comment(buf);
        return;
      case LineKind.words:
        if ((scan.mask & M_BIT) !== 0) this.mLine(buf);
        this.interpreter.run(scan);
        return;
      case LineKind.text:
        this.mLine(buf);
        return;
      case LineKind.named:
        this.namedLine(buf);
        return;
      default:
        this.outputs.unreadable(buf, scan);
        this.findings.add("unreadable-line", "warning", "this line can't be read as G-code; it is kept as it stands", {
          line: this.scan.line,
        });
    }
  }

  private mLine(buf: Uint8Array): void {
    const { scan } = this;
    const ours = ownTag(buf, scan.commentStart, scan.commentEnd);
    const before = this.outputs.pauses.length;
    const timed = this.outputs.numbered(buf, scan, ours);
    if (this.outputs.pauses.length > before) this.pauseIfNew();
    if (timed) this.builder.timeline.stamp(timed);
  }

  private namedLine(buf: Uint8Array): void {
    const { scan } = this;
    const end = Math.min(scan.codeEnd, scan.codeStart + NAMED_BYTES);
    let text = "";
    for (let k = scan.codeStart; k < end; k++) text += String.fromCharCode(buf[k]);
    const { name, parameters } = parseNamed(text);
    const limits = namedLimits(name, parameters);
    if (limits) this.builder.limits(limits);
    const { nozzleC, bedC } = namedTemperatures(name, parameters);
    if (nozzleC !== undefined) this.builder.nozzle(nozzleC);
    if (bedC !== undefined) this.builder.bed(bedC);
    if (name === "TEMPERATURE_WAIT") this.builder.wait("temperature", null);
    const before = this.outputs.pauses.length;
    const timed = this.outputs.named(text, ownTag(buf, scan.commentStart, scan.commentEnd));
    if (this.outputs.pauses.length > before) this.pauseIfNew();
    if (timed) this.builder.timeline.stamp(timed);
  }

  /** The queue runs empty at a pause. */
  private pauseIfNew(): void {
    this.builder.wait("pause", null);
  }

  private comment(buf: Uint8Array): void {
    const { scan } = this;
    if (isProvenance(buf, scan.commentStart, scan.commentEnd)) {
      this.readProvenance(buf);
      return;
    }
    const fact = this.comments.read(buf, scan.commentStart, scan.commentEnd);
    if (fact)
      this.builder.comment(fact, () => String.fromCharCode(...buf.subarray(scan.commentStart, scan.commentEnd)).trim());
    else this.setting(buf);
  }

  private readProvenance(buf: Uint8Array): void {
    const { commentStart, commentEnd } = this.scan;
    const text = String.fromCharCode(...buf.subarray(commentStart, Math.min(commentEnd, commentStart + 8192)));
    if (this.provenance) {
      this.findings.add("provenance-twice", "warning", "a second provenance line; the first one counts", {
        line: this.scan.line,
      });
      return;
    }
    let data: unknown;
    try {
      data = JSON.parse(text.slice(PROVENANCE_PREFIX.length - 1));
    } catch {
      this.findings.add("provenance-broken", "warning", "a provenance line that can't be read", {
        line: this.scan.line,
      });
    }
    const { builder } = this;
    this.provenance = {
      line: this.scan.line,
      offset: builder.offset(),
      length: builder.lineBytes(),
      text: `;${text}`,
      data,
    };
  }

  /** `filament diameter = 2.85`, the one setting that volume needs. */
  private setting(buf: Uint8Array): void {
    const { commentStart, commentEnd } = this.scan;
    if (commentEnd - commentStart > 80 || buf.subarray(commentStart, commentEnd).indexOf(EQUALS) < 0) return;
    const text = String.fromCharCode(...buf.subarray(commentStart, commentEnd));
    const match = /^\s*filament[ _]diameter\s*=\s*(\d+(?:\.\d+)?)/i.exec(text);
    const diameter = Number(match?.[1]);
    if (diameter >= 0.5 && diameter <= 10) this.builder.filamentDiameterMm = diameter;
  }

  private checkSum(buf: Uint8Array, start: number): void {
    const { scan } = this;
    if (scan.kind === LineKind.blank || (scan.mask & N_BIT) === 0) return;
    this.numbered = true;
    const computed = hostChecksum(buf, start, scan.starAt);
    if (computed !== scan.checksum)
      throw new Refusal(
        "checksum",
        `the checksum of line ${this.scan.line} is ${scan.checksum < 0 ? "missing" : scan.checksum}, its bytes give ${computed}`,
        "The file is damaged: export or transfer it again.",
        { line: this.scan.line },
      );
  }

  private lineNumber(): void {
    const { scan } = this;
    const number = scan.value[13];
    const resets = (scan.mask & M_BIT) !== 0 && scan.value[12] === 110;
    if (scan.starAt >= 0 && !resets && this.lastNumber >= 0 && number !== this.lastNumber + 1)
      this.findings.add(
        "number-order",
        "warning",
        `line number ${number} follows ${this.lastNumber}: firmware asks for a resend there`,
        {
          line: this.scan.line,
        },
      );
    this.lastNumber = number;
  }
}
