import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { hostChecksum } from "#shared/gcode/host-checksum.ts";
import { END, heights, marker, ring, rings, START } from "#tests/helpers/part.ts";
import { findingsOf, readText, refusalOf } from "#tests/helpers/reading.ts";

const withSum = (line: string): string => `${line}*${hostChecksum(line)}`;
/** Every line but comments and blank ones with a number and a checksum. */
const numbered = (lines: readonly string[]): string[] => {
  let n = 0;
  return lines.map((line) => (line === "" || line.startsWith(";") ? line : withSum(`N${++n} ${line}`)));
};
const PART = [...START, ...ring(0.2)];

describe("G12: published lines with their checksums are accepted", () => {
  test.each([
    "N3 T0*57",
    "N4 G92 E0*67",
    "N5 G28*22",
    "N6 G1 F1500.0*82",
    "N7 G1 X2.0 Y2.0 F3000.0*85",
    "N8 G1 X3.0 Y3.0*33",
    "N0 M106*36",
    "N1 G28*18",
    "N2 M107*39",
    "N1 M115*39",
    "N10 G92 X0 Y0 Z0 A0 B0*107",
    "N123 M106 S128*108",
    "N1 M106 S255*100",
    "N1 M106 P1 S0*39",
    "N0 M106 *4",
    "N1 M106 S255*100 ; with a comment",
    "N1 M106 S255*100   ",
    "N1 M106 S255*0100",
  ])("%s", (line) => {
    const reading = readText([...PART, line]);
    expect(reading.file.numbered).toBe(true);
    expect(findingsOf(reading)).toEqual([]);
  });
});

describe("a wrong checksum is refused", () => {
  test("naming the first wrong line, what it says and what its bytes give", () => {
    const lines = numbered([...PART, ...END]);
    lines[8] = lines[8].replace("Y50", "Y51");
    lines[9] = lines[9].replace("X70", "X71");
    const { code, message, place } = refusalOf(() => readText(lines));
    expect(code).toBe("checksum");
    expect(place).toEqual({ line: 9 });
    expect(message).toMatch(/^the checksum of line 9 is \d+, its bytes give \d+$/);
  });

  test.each([
    "N1 M106 S255*101",
    "N1 M106 S255 *100",
    "N1 M106 S255*",
    "N1 M117 hello*1",
    "N1 SET_PIN PIN=a VALUE=1*1",
    "N1 M106 S255*355",
  ])("%s", (line) => {
    expect(refusalOf(() => readText([...PART, line]))).toMatchObject({
      code: "checksum",
      place: { line: PART.length + 1 },
    });
  });

  test("a byte changed anywhere before the star is found", () => {
    const line = "N12 G1 X70.25 E0.8 F1800";
    fc.assert(
      fc.property(fc.nat(line.length - 2), fc.constantFrom(..."0123456789"), (at, digit) => {
        fc.pre(/\d/.test(line[at + 1]) && line[at + 1] !== digit);
        const changed = line.slice(0, at + 1) + digit + line.slice(at + 2);
        expect(refusalOf(() => readText([...PART, `${changed}*${hostChecksum(line)}`])).code).toBe("checksum");
      }),
    );
  });

  test("a star without a line number is no checksum", () => {
    expect(findingsOf(readText([...PART, "G1 X80 E1*5"]))).toEqual([]);
    expect(readText([...PART, "G1 X80 E1*5"]).file.numbered).toBe(false);
  });
});

describe("line numbers", () => {
  const orderOf = (...lines: string[]): string[] => findingsOf(readText([...PART, ...lines.map(withSum)]));

  test("in order are no finding, whatever the lines hold", () => {
    const lines = rings(heights(2), marker);
    const reading = readText(
      numbered([...START, "M117 layer 1", ...lines, "SET_PIN PIN=x VALUE=1", "M118 done", ...END]),
    );
    expect(findingsOf(reading)).toEqual([]);
    expect(reading.layers).toHaveLength(2);
    expect(reading.layers[1].timeS).toBeCloseTo(readText([...START, ...lines, ...END]).layers[1].timeS, 9);
  });

  test("out of order are told: firmware asks for a resend there", () => {
    expect(orderOf("N1 G28 X", "N2 G28 X", "N4 G28 X", "N5 G28 X", "N5 G28 X")).toEqual([
      `number-order ${PART.length + 3}`,
      `number-order ${PART.length + 5}`,
    ]);
    expect(orderOf("N7 M117 a", "N9 M117 b")).toEqual([`number-order ${PART.length + 2}`]);
  });

  test("may be set anew by M110", () => {
    expect(orderOf("N7 G28 X", "N3 M110 N3", "N4 G28 X")).toEqual([]);
    expect(orderOf("N7 G28 X", "N100 M110", "N101 G28 X")).toEqual([]);
    expect(orderOf("N-1 M110", "N0 G28 X")).toEqual([]);
  });

  test("without checksums may be anything", () => {
    const reading = readText([...PART, "N10 G28 X", "N5 G28 X", "N000020 G28 Y"]);
    expect(findingsOf(reading)).toEqual([]);
    expect(reading.file.numbered).toBe(false);
  });
});
