import { expect, test } from "vitest";
import { aligned, bytes, counted, moment } from "#src/lib/format.ts";
import { documentFileName } from "#src/lib/save-file.ts";

test("numbers of unlike precision end in the same column when right-aligned", () => {
  const texts = [aligned(12, 0, 3), aligned(0.25, 2, 3), aligned(-1.5, 1, 3), aligned(3.125, 3, 3)];
  const points = texts.map((text) => text.length - (text.indexOf(".") < 0 ? text.trimEnd().length : text.indexOf(".")));
  expect(new Set(points)).toEqual(new Set([4]));
});

test.each([
  [999, "999 B"],
  [1_853_116, "1.85 MB"],
  [14_000_000, "14.0 MB"],
  [999_999, "1.00 MB"],
  [2_500_000_000, "2.50 GB"],
])("%d bytes are said as %s", (count, text) => expect(bytes(count)).toBe(text));

test("moments are local, largest unit first, and a text that is none does not break a table", () => {
  expect(moment(new Date(2026, 11, 1, 9, 5).toISOString())).toBe("2026-12-01 09:05");
  expect(moment("yesterday")).toBe("–");
});

test("counts agree with their noun", () => {
  expect(counted(1, "layer")).toBe("1 layer");
  expect(counted(0, "layer")).toBe("0 layers");
  expect(counted(46_732)).toBe("46\u202f732");
});

test("a document's file is named after it, whatever it is called", () => {
  expect(documentFileName("Seal ring, stiff base")).toBe("seal-ring-stiff-base.json");
  expect(documentFileName("../../Ω")).toBe("document.json");
});
