import { describe, expect, test } from "vitest";
import { refuseForeign } from "#shared/gcode/sniff.ts";
import { cutEvery, latin, readChunks, refusalOf } from "#tests/helpers/reading.ts";

const BINARY_STL = `${"exported".padEnd(80, " ")}\u0002\u0000\u0000\u0000${"\u0000\u0012".repeat(50)}`;

describe("what is no text G-code is refused, saying what it looks like", () => {
  test.each([
    ["PK\u0003\u0004rest", "ZIP archive"],
    ["GCDE\u0001\u0000", "binary G-code container"],
    ["\u001f\u008b\u0008", "gzip inside gzip"],
    ["7z\u00bc\u00af'", "7z archive"],
    ["Rar!\u001a\u0007", "RAR archive"],
    ["%PDF-1.7", "PDF document"],
    ["\u0089PNG\r\n", "PNG picture"],
    ["\u00ff\u00d8\u00ff\u00e0", "JPEG picture"],
    ["\u007fELF\u0002", "a program"],
    ["\u00ff\u00feG\u0000", "UTF-16 text"],
    ["\u00fe\u00ff\u0000G", "UTF-16 text"],
    ["<?xml version", "XML document"],
    ['{ "format": 1 }', "JSON document"],
    ["solid bracket\nfacet normal 0 0 1\n", "STL model"],
    ["  facet normal 0 0 1\n", "STL model"],
    [BINARY_STL, "binary data"],
    ["G28\nG1 X5\u0000\n", "binary data"],
  ])("%j", (text, looksLike) => {
    for (const read of [
      () => refuseForeign(latin(text)),
      () => readChunks([latin(text)]),
      () => readChunks(cutEvery(latin(text), 1)),
      () => readChunks([latin(`\u00ef\u00bb\u00bf${text}`)]),
    ])
      expect(refusalOf(read)).toMatchObject({
        code: "not-gcode",
        message: expect.stringContaining(looksLike),
        remedy: expect.stringMatching(/\w+.*\.$/),
        place: { line: 1 },
      });
  });
});

test.each([
  "",
  ";solid infill\n",
  "solidify\n",
  "%\nG21\n",
  "G28 ; {a}\n",
  "\u00ef\u00bb\u00bfG28\n",
  "; h\u00e4rten\n",
])("%j is let through", (text) => {
  expect(() => refuseForeign(latin(text))).not.toThrow();
});

test("zero bytes behind the first 512 are odd lines, not a reason to refuse", () => {
  const part = `${";".padEnd(600, "x")}\nG1 X10 Y10 F3000\n\u0000\nG1 X20 E1\n`;
  expect(readChunks([latin(part)]).findings).toMatchObject([{ code: "unreadable-line", line: 3 }]);
});
