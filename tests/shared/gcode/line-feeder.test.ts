import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { LineFeeder, MAX_LINE_BYTES } from "#shared/gcode/line-feeder.ts";
import { cutAt, cutEvery, latin, refusalOf } from "#tests/helpers/reading.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

/** The lines that come out, each with its place; every block is checked to be whole lines with a byte behind them. */
function feed(chunks: Iterable<Uint8Array>) {
  const lines: { text: string; offset: number }[] = [];
  const feeder = new LineFeeder((buf, from, to, fileOffset, open) => {
    expect(to).toBeGreaterThan(from);
    const text = Buffer.from(buf.subarray(from, to)).toString("latin1");
    expect(buf[to - 1] === 10 || (buf[to - 1] === 13 && buf.length > to)).toBe(true);
    let offset = fileOffset;
    for (const line of text.match(/[^\r\n]*(\r\n|\r|\n)/g)!) {
      lines.push({ text: open ? line.slice(0, -1) : line, offset });
      offset += line.length;
    }
  });
  for (const chunk of chunks) feeder.push(chunk);
  const finalNewline = feeder.end();
  return { lines, finalNewline, bytes: feeder.bytes };
}

const textBytes = fc
  .array(fc.constantFrom("\n", "\r", "\r\n", "G1 X5", ";", "\u0000", "\u00e9", " "), { maxLength: 30 })
  .map((parts) => latin(parts.join("")));

test("however a file is cut, the same lines come out, and joined they are the file", () => {
  fc.assert(
    fc.property(textBytes, fc.array(fc.nat(60)), (bytes, cuts) => {
      const whole = feed([bytes]);
      for (const chunks of [
        cutAt(
          bytes,
          [...cuts].sort((a, b) => a - b),
        ),
        cutEvery(bytes, 1),
      ])
        expect(feed(chunks)).toEqual(whole);
      expect(latin(whole.lines.map(({ text }) => text).join(""))).toEqual(bytes);
      expect(whole.bytes).toBe(bytes.length);
    }),
    { numRuns: 200 },
  );
});

test("the place of a line is the sum of the lines before it", () => {
  fc.assert(
    fc.property(textBytes, (bytes) => {
      let offset = 0;
      for (const line of feed([bytes]).lines) {
        expect(line.offset).toBe(offset);
        offset += line.text.length;
      }
    }),
  );
});

test("line feed, carriage return and both together each end one line", () => {
  expect(feed([latin("a\nb\r\nc\rd\n\r\n\r\r")]).lines.map(({ text }) => text)).toEqual([
    "a\n",
    "b\r\n",
    "c\r",
    "d\n",
    "\r\n",
    "\r",
    "\r",
  ]);
});

test("a carriage return at the end of a chunk waits for its line feed", () => {
  const { lines } = feed(["a\r", "\nb\r", "c"].map(latin));
  expect(lines.map(({ text }) => text)).toEqual(["a\r\n", "b\r", "c"]);
});

test("a last line without a terminator is handed on, and told", () => {
  expect(feed([latin("a\nb")])).toMatchObject({ finalNewline: false, bytes: 3, lines: [{}, { text: "b", offset: 2 }] });
  expect(feed([latin("a\nb\r")])).toMatchObject({ finalNewline: true, bytes: 4 });
  expect(feed([])).toEqual({ lines: [], finalNewline: true, bytes: 0 });
});

test("the bytes taken so far are known at any time", () => {
  const feeder = new LineFeeder(() => undefined);
  feeder.push(latin("G1 X5\nG1 Y"));
  expect(feeder.bytes).toBe(10);
  feeder.push(latin("7\n"));
  expect(feeder.bytes).toBe(12);
});

describe("the longest line", () => {
  const lineOf = (bytes: number): Uint8Array => latin(`G28\n;${"x".repeat(bytes - 2)}\nG28\n`);

  test("has 1 MiB with its terminator", () => {
    for (const size of [1 << 16, 3 << 20]) expect(feed(cutEvery(lineOf(MAX_LINE_BYTES), size)).lines).toHaveLength(3);
  });

  test("is refused beyond that, at the same byte however the file is cut", () => {
    const bytes = lineOf(MAX_LINE_BYTES + 1);
    const refusals = [1 << 12, 1 << 16, 1 << 20, 3 << 20].map((size) => refusalOf(() => feed(cutEvery(bytes, size))));
    for (const refusal of refusals) expect(refusal).toEqual(refusals[0]);
    expect(refusals[0]).toMatchObject({ code: "not-gcode", message: expect.stringContaining("at byte 4") });
  });

  test("is refused without a terminator too", () => {
    const bytes = new Uint8Array(MAX_LINE_BYTES + 1).fill(65);
    expect(refusalOf(() => feed([bytes])).code).toBe("not-gcode");
    expect(refusalOf(() => feed(cutEvery(bytes, 1 << 16))).code).toBe("not-gcode");
  });

  test("says nothing of a file of short lines that end in carriage returns and come byte by byte", () => {
    const bytes = new Uint8Array(MAX_LINE_BYTES + 10).fill(13);
    const feeder = new LineFeeder(() => undefined);
    for (let k = 0; k < bytes.length; k++) feeder.push(bytes.subarray(k, k + 1));
    feeder.end();
    expect(feeder.bytes).toBe(bytes.length);
  });
});
