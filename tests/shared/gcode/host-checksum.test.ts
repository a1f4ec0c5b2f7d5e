import fc from "fast-check";
import { expect, test } from "vitest";
import { hostChecksum } from "#shared/gcode/host-checksum.ts";

test.each([
  ["N3 T0", 57],
  ["N4 G92 E0", 67],
  ["N5 G28", 22],
  ["N6 G1 F1500.0", 82],
  ["N7 G1 X2.0 Y2.0 F3000.0", 85],
  ["N8 G1 X3.0 Y3.0", 33],
  ["N0 M106", 36],
  ["N1 G28", 18],
  ["N2 M107", 39],
  ["N1 M115", 39],
  ["N10 G92 X0 Y0 Z0 A0 B0", 107],
  ["N123 M106 S128", 108],
  ["N1 M106 S255", 100],
  ["N1 M106 P1 S0", 39],
  ["N0 M106 ", 4],
])("G12: the checksum of %j is %i", (line, sum) => {
  expect(hostChecksum(line)).toBe(sum);
  expect(hostChecksum(new TextEncoder().encode(line))).toBe(sum);
});

test("a range of a longer run of bytes gives the same as the line alone", () => {
  fc.assert(
    fc.property(fc.uint8Array(), fc.uint8Array(), fc.uint8Array(), (before, line, after) => {
      const bytes = new Uint8Array([...before, ...line, ...after]);
      expect(hostChecksum(bytes, before.length, before.length + line.length)).toBe(hostChecksum(line));
    }),
  );
});

test("text beyond ASCII has no checksum, since its bytes depend on an encoding", () => {
  expect(() => hostChecksum("N1 M117 é")).toThrow(RangeError);
});
