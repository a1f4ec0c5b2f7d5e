import fc from "fast-check";
import { expect, test } from "vitest";
import { LineStarts, LinesOfOffsets, OffsetsOfLines } from "#server/toolpaths/line-starts.ts";
import { cutAt, latin } from "#tests/helpers/reading.ts";

const TEXT = fc.array(fc.constantFrom("\n", "\r\n", "\r", "G1", ";")).map((parts) => parts.join(""));
const CUTS = fc.array(fc.nat(20)).map((cuts) => cuts.sort((a, b) => a - b));

/** Offsets at which lines start, by a regular expression; a text that ends with a terminator has an empty last line. */
const startsOf = (text: string): number[] => [
  0,
  ...[...text.matchAll(/\r\n|\r|\n/g)].map((m) => m.index + m[0].length),
];

test("lines start behind LF, CR LF and CR, wherever the bytes were cut", () => {
  fc.assert(
    fc.property(TEXT, CUTS, (text, cuts) => {
      const found = [0];
      const starts = new LineStarts((offset, line) => {
        found.push(offset);
        expect(line).toBe(found.length);
      });
      for (const piece of cutAt(latin(text), cuts)) starts.push(piece);
      starts.end();
      expect(found).toEqual(startsOf(text));
    }),
  );
});

test("offsets are found by lines and lines by offsets, one the inverse of the other", () => {
  fc.assert(
    fc.property(TEXT, CUTS, (text, cuts) => {
      const offsets = startsOf(text);
      const lines = offsets.map((_, k) => k + 1);
      const toLines = new LinesOfOffsets(offsets);
      const toOffsets = new OffsetsOfLines([...lines, lines.length + 1]);
      for (const piece of cutAt(latin(text), cuts)) {
        toLines.push(piece);
        toOffsets.push(piece);
      }
      expect(toLines.end()).toEqual(lines);
      expect(toOffsets.end()).toEqual([...offsets, text.length]);
    }),
  );
});

test("a byte inside a line belongs to that line", () => {
  const finder = new LinesOfOffsets([0, 1, 3, 4]);
  finder.push(latin("ab\ncd"));
  expect(finder.end()).toEqual([1, 1, 2, 2]);
});
