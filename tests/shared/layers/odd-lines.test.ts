import { describe, expect, test } from "vitest";
import type { Reading } from "#shared/layers/reading.ts";
import { heights, marker, ring, rings, START } from "#tests/helpers/part.ts";
import { findingsOf, latin, readBytes, readText } from "#tests/helpers/reading.ts";

const PART = [...START, ...ring(0.2)];
const at = PART.length + 1;
const read = (...lines: string[]): Reading => readText([...PART, ...lines]);

describe("what can't be read is a finding, and nothing else changes", () => {
  const plain = readText(PART);

  test.each(["/G1 X5 E1", "{if layer_z < 2}G1 X9 E1", "[first_layer] G1 X9 E1", "G1 X=5 E1", "\u00ff\u00fe", "?"])(
    "%j",
    (line) => {
      const reading = read(line);
      expect(findingsOf(reading)).toEqual([`unreadable-line ${at}`]);
      expect(reading.layers[0].timeS).toBe(plain.layers[0].timeS);
      expect(reading.file.lines).toBe(at);
    },
  );

  test("twenty of a kind are kept, the rest are counted", () => {
    const reading = read(...Array.from({ length: 75 }, () => "?"));
    expect(reading.findings).toHaveLength(21);
    expect(reading.findings[20]).toEqual({
      code: "unreadable-line",
      severity: "warning",
      message: "and 55 more like it, 75 in all",
    });
  });
});

describe("what looks odd is read as the trade means it", () => {
  const same = (a: string[], b: string[]): void => {
    const [one, two] = [read(...a), read(...b)].map(({ layers, totals }) => ({ layers: layers.length, totals }));
    expect(one).toEqual(two);
  };

  test("G1E10F50 feeds 10 mm", () => {
    same(["G1E10F50", "G1 X80 E1"], ["G1 E10 F50", "G1 X80 E1"]);
  });

  test("blanks and signs: `G 28`, `Z+0.5`, `g0x +0. 12 34y 7`", () => {
    same(["G1 Z+0.5", "G1 X90 E1"], ["G1 Z.5", "G1 X90 E1"]);
    same(["g0x +0. 12 34y 7", "G1 X90 E1"], ["G0 X0.1234 Y7", "G1 X90 E1"]);
  });

  test("`M141 S0;text` is a command with a comment", () => {
    expect(findingsOf(read("M141 S0;text", "M141 S0;;M106 S255"))).toEqual([]);
    expect(read("M141 S0;M106 S255").controls).toEqual([]);
  });

  test("comments of 21 kB that hold commands are comments", () => {
    const long = "M106 S255 G1 X5 E1 ".repeat(1200);
    const reading = read(`; ${long}`, `(${long})`, "G1 X80 E1");
    expect(reading.controls).toEqual([]);
    expect(findingsOf(reading)).toEqual([]);
    same([`; ${long}`, "G1 X80 E1"], ["G1 X80 E1"]);
  });

  test("an extruder on axis A, and material laid by G0", () => {
    same(["G1 X80 A1", "G1 X90 A1"], ["G1 X80 E1", "G1 X90 E1"]);
    same(["G0 X80 E1"], ["G1 X80 E1"]);
    expect(read("G0 X80 E1").layers[0].filamentMm).toBeCloseTo(4.2, 9);
  });

  test("T255 and T1000 are no tools", () => {
    expect(readText([";LAYER:0", ...PART, "T255", "T1000", "T1"]).layers[0].waits).toEqual([
      { kind: "tool", line: PART.length + 4, seconds: null },
    ]);
  });

  test("a percent sign frames the program", () => {
    const framed = readText(["%", ...PART, "%"]);
    expect(findingsOf(framed)).toEqual([]);
    expect(framed.layers).toHaveLength(1);
  });

  test("a full circle without X and Y", () => {
    const reading = read("G2 I10 J0 E2 F600");
    expect(findingsOf(reading)).toEqual([]);
    expect(reading.layers[0].depositedLengthMm).toBeCloseTo(80 + 2 * Math.PI * 10, 0);
  });

  test("an arc without a centre is told with its line", () => {
    expect(findingsOf(read("G2 X90 Y90 I1 J1 E1"))).toEqual([`arc-invalid ${at}`]);
  });

  test("numbers beyond any machine are told, and every measure stays finite", () => {
    const huge = "9".repeat(400);
    const reading = read(
      `G1 X${huge} E1`,
      `G4 S${huge}`,
      `M104 S${huge}`,
      `M140 S${huge}`,
      `G92 E${huge}`,
      "G1 X90 E1",
      ...ring(0.4),
    );
    expect(findingsOf(reading)).toEqual([0, 1, 2, 3, 4].map((k) => `number-too-large ${at + k}`));
    for (const layer of reading.layers)
      for (const value of Object.values(layer)) if (typeof value === "number") expect(value).toBeLessThan(1e9);
  });
});

describe("macros and conditions may hide anything", () => {
  test("a name not known is told once", () => {
    const reading = read("CLEAN_NOZZLE X=5", "CLEAN_NOZZLE X=6", "clean_nozzle", 'M98 P"a.g"', "IF {x > 2}", "@host");
    expect(findingsOf(reading)).toEqual([`macro ${at}`, `macro ${at + 3}`, `macro ${at + 4}`, `macro ${at + 5}`]);
    expect(reading.findings[0].message).toContain("CLEAN_NOZZLE");
  });

  test("names known to drive no output are not", () => {
    const known = [
      "SET_VELOCITY_LIMIT ACCEL=500",
      "EXCLUDE_OBJECT_START NAME=a",
      "SET_PRESSURE_ADVANCE ADVANCE=0.1",
      "SAVE_GCODE_STATE",
    ];
    expect(findingsOf(read(...known))).toEqual([]);
  });

  test("a message is no macro", () => {
    expect(findingsOf(read("M117 CLEAN_NOZZLE", "M118 M106 S255", "M117 50% done", "M117 2 M600"))).toEqual([]);
    expect(read("M117 2 M600", "M118 3 M106 S255").pauses).toEqual([]);
  });
});

describe("line ends", () => {
  const lines = [...START, ...rings(heights(2), marker), "M106 S9"];
  const facts = (text: string) => readBytes(latin(text)).file;

  test.each([
    ["lf", "\n"],
    ["crlf", "\r\n"],
    ["cr", "\r"],
  ])("%s", (newline, end) => {
    expect(facts(lines.join(end) + end)).toMatchObject({ newline, lines: lines.length, finalNewline: true });
    expect(facts(lines.join(end))).toMatchObject({ newline, lines: lines.length, finalNewline: false });
  });

  test("mixed", () => {
    expect(facts(`${lines.join("\n")}\r\n`)).toMatchObject({ newline: "mixed", lines: lines.length });
    expect(facts(lines.join("\n").replace("\n", "\r"))).toMatchObject({ newline: "mixed", lines: lines.length });
    expect(facts(`${lines.join("\r\n")}\n\r`)).toMatchObject({ newline: "mixed", lines: lines.length + 1 });
  });

  test("none at all in a file of one line", () => {
    expect(facts("G1 X5 E1")).toMatchObject({ newline: "none", lines: 1, finalNewline: false, bytes: 8 });
  });

  test("give the same layers, with places that differ by the bytes only", () => {
    const [lf, crlf, cr] = ["\n", "\r\n", "\r"].map((end) => readBytes(latin(lines.join(end) + end)));
    for (const other of [crlf, cr]) {
      expect(other.totals).toEqual(lf.totals);
      expect(other.layers.map(({ firstLine, lastLine }) => [firstLine, lastLine])).toEqual(
        lf.layers.map(({ firstLine, lastLine }) => [firstLine, lastLine]),
      );
    }
    expect(crlf.layers[1].firstByte - lf.layers[1].firstByte).toBe(lf.layers[1].firstLine - 1);
    expect(cr.layers[1].firstByte).toBe(lf.layers[1].firstByte);
  });
});

describe("a byte order mark", () => {
  test("is no part of the first line, and none of its bytes are lost", () => {
    const text = ["M106 S255", ...PART].join("\n");
    const [plain, marked] = [readBytes(latin(text)), readBytes(latin(`\u00ef\u00bb\u00bf${text}`))];
    expect(findingsOf(marked)).toEqual(findingsOf(plain));
    expect(marked.totals).toEqual(plain.totals);
    expect(marked.controls[0]).toEqual({ ...plain.controls[0], offset: 3 });
    expect(marked.file.bytes).toBe(plain.file.bytes + 3);
    expect(marked.layers[0].firstByte).toBe(plain.layers[0].firstByte + 3);
  });

  test("alone is a file without a layer", () => {
    expect(() => readBytes(latin("\u00ef\u00bb\u00bf"))).toThrow(/moves in X or Y/);
  });
});

describe("the provenance of a tuned file", () => {
  const provenance = '{"engine":"1","input":"ab"}';

  test("is kept with its place and its data", () => {
    const reading = read(`;quenchline ${provenance}`);
    const offset = PART.join("\n").length + 1;
    expect(reading.provenance).toEqual({
      line: at,
      offset,
      length: provenance.length + 13,
      text: `;quenchline ${provenance}`,
      data: JSON.parse(provenance),
    });
    expect(readText(PART).provenance).toBeUndefined();
  });

  test("that is broken is told, and its line still known", () => {
    const reading = read(";quenchline {not json");
    expect(findingsOf(reading)).toEqual([`provenance-broken ${at}`]);
    expect(reading.provenance).toMatchObject({ line: at, data: undefined });
  });

  test("counts once", () => {
    const reading = read(`;quenchline ${provenance}`, ";quenchline {}");
    expect(findingsOf(reading)).toEqual([`provenance-twice ${at + 1}`]);
    expect(reading.provenance?.line).toBe(at);
  });
});
