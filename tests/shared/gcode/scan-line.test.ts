import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { LineScan } from "#shared/gcode/scan-line.ts";
import { codeOf, gWordsOf, scanText } from "#tests/helpers/scanning.ts";
import { decimal, moveLine, signed, strewn, wordLine } from "#tests/helpers/words.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

describe("numbers", () => {
  const numberOf = (text: string): number => scanText(`G4 P${text}`).words.P;

  test("are the nearest doubles of the decimals written, on the plain path and off it", () => {
    fc.assert(
      fc.property(signed(15), (text) => {
        expect(numberOf(text)).toBe(Number(text));
        expect(scanText(`G1 X${text}`).words.X).toBe(Number(text));
      }),
      { numRuns: 500 },
    );
  });

  test("stay correctly rounded however many digits they have", () => {
    fc.assert(
      fc.property(decimal(60), fc.nat(420), (text, zeros) => {
        expect(numberOf(text)).toBe(Number(text));
        expect(numberOf("0".repeat(zeros) + text)).toBe(Number(text));
      }),
    );
  });

  test.each([
    ["+5", 5],
    [".5", 0.5],
    ["-.5", -0.5],
    ["007", 7],
    ["0000000000001.5", 1.5],
    ["12.", 12],
    ["0.30000000000000004", 0.30000000000000004],
    ["9007199254740993", 9007199254740992],
    ["123456789012.123456789012", 123456789012.12346],
    ["0.000000000000000000000000123456", 1.23456e-25],
  ])("%s is %d", (text, value) => {
    expect(numberOf(text)).toBe(value);
    expect(scanText(`G1 X${text}`).words.X).toBe(value);
  });

  test("of hundreds of digits keep their magnitude", () => {
    expect(numberOf(`${"0".repeat(395)}1${"0".repeat(20)}`)).toBe(1e20);
    expect(numberOf(`0.${"0".repeat(300)}1${"2".repeat(300)}`)).toBe(Number(`0.${"0".repeat(300)}1${"2".repeat(300)}`));
    expect(numberOf("9".repeat(500))).toBe(Number.POSITIVE_INFINITY);
  });

  test("minus zero is kept as such, so that both paths agree to the bit", () => {
    expect(numberOf("-0")).toBe(-0);
    expect(scanText("G1 X-0").words.X).toBe(-0);
  });

  test("have no exponent: an E starts the next word", () => {
    expect(scanText("G1E10F50").words).toEqual({ G: 1, E: 10, F: 50 });
    expect(scanText("G1 X1e-05").words).toEqual({ G: 1, X: 1, E: -5 });
  });

  test("may have blanks between any two characters", () => {
    fc.assert(
      fc.property(
        signed(12).chain((text) => fc.tuple(fc.constant(text), strewn(text))),
        ([text, apart]) => {
          expect(scanText(`G1 Y${apart} Z3`)).toMatchObject({ kind: "words", words: { G: 1, Y: Number(text), Z: 3 } });
        },
      ),
    );
  });
});

describe("words", () => {
  test("G1: blanks outside comments mean nothing, between a letter and its number and inside a number too", () => {
    expect(scanText("g0x +0. 12 34y 7").words).toEqual({ G: 0, X: 0.1234, Y: 7 });
    expect(scanText("G 28").words).toEqual({ G: 28 });
    expect(scanText("\tG1\tX 1 0\tE- .5").words).toEqual({ G: 1, X: 10, E: -0.5 });
    expect(scanText("G1 Z+0.5").words).toEqual({ G: 1, Z: 0.5 });
  });

  test("G2: comments may stand between words, not between a letter and its number", () => {
    expect(scanText("S100(set speed)F200(feed)")).toMatchObject({
      kind: "words",
      words: { S: 100, F: 200 },
      comment: "set speed",
    });
    expect(scanText("S(speed)100F(feed)").kind).toBe("unreadable");
  });

  test("are read in either case, glued or apart", () => {
    const words = { G: 1, X: 10, Y: -0.5, E: 0.02, F: 1200 };
    for (const line of ["G1 X10 Y-.5 E0.02 F1200", "g1x10y-.5e.02f1200", "G01X10.Y-0.50E+.02F1200.0"])
      expect(scanText(line).words).toEqual(words);
  });

  test("in any order mean the same", () => {
    fc.assert(
      fc.property(fc.shuffledSubarray(["G1", "X5", "Y-6", "Z.7", "E8", "F900"], { minLength: 6 }), (line) => {
        expect(scanText(line.join(" "))).toMatchObject({
          words: { G: 1, X: 5, Y: -6, Z: 0.7, E: 8, F: 900 },
          commands: 1,
        });
      }),
    );
  });

  test("without a number are noted as bare", () => {
    expect(scanText("G28 X Y")).toMatchObject({ words: { G: 28 }, bare: "XY", kind: "words" });
    expect(scanText("M106 S")).toMatchObject({ words: { M: 106 }, bare: "S" });
    expect(scanText("M84 X Y E")).toMatchObject({ bare: "EXY" });
    expect(scanText("G1 X. Y-")).toMatchObject({ words: { G: 1 }, bare: "XY" });
  });

  test("that stand twice keep the last number, and are noted", () => {
    expect(scanText("G1 X1 X2")).toMatchObject({ words: { G: 1, X: 2 }, repeated: "X" });
    expect(scanText("M106 P1 P2 S3")).toMatchObject({ words: { M: 106, P: 2, S: 3 }, repeated: "P" });
  });

  test("several commands on a line are counted, and the G words kept in order", () => {
    expect(scanText("G21 G90 M82 G1 X5").commands).toBe(4);
    expect(gWordsOf("G21 G90 M82 G01 X5")).toEqual([21, 90, 1]);
    expect(scanText("M106 S255")).toMatchObject({ commands: 1 });
    expect(scanText("X5 Y6")).toMatchObject({ commands: 0, kind: "words" });
  });
});

describe("comments", () => {
  test("begin at a semicolon and run to the end of the line, commands inside or not", () => {
    expect(scanText("G1 X5 ; M106 S255")).toMatchObject({ words: { G: 1, X: 5 }, comment: " M106 S255" });
    expect(scanText("; G1 X5")).toMatchObject({ kind: "blank", words: {}, comment: " G1 X5" });
  });

  test("in parentheses may nest, hold a semicolon, and stand before, between and behind words", () => {
    expect(scanText("(a (b) c) G1 (d;e) X5 (f)")).toMatchObject({
      kind: "words",
      words: { G: 1, X: 5 },
      comment: "a (b) c",
    });
  });

  test("in parentheses that never close run to the end of the line", () => {
    expect(scanText("G1 X5 (never closed Y6 ; Z7")).toMatchObject({
      words: { G: 1, X: 5 },
      comment: "never closed Y6 ; Z7",
    });
  });

  test("of 21,192 characters that hold commands stay comments", () => {
    const text = "M104 S300 G1 X5 ".repeat(1325).slice(0, 21_192);
    expect(scanText(`;${text}`)).toMatchObject({ kind: "blank", words: {}, comment: text, bytes: 21_194 });
    expect(scanText(`G1 X1 (${text}) Y2`).words).toEqual({ G: 1, X: 1, Y: 2 });
  });
});

describe("lines that are not words", () => {
  test("messages and file names are text, with a number in front or not", () => {
    expect(scanText("M117 Layer 3 of 120 X5; E2")).toMatchObject({ kind: "text", words: { M: 117 } });
    expect(codeOf("M117 Layer 3 ; E2")).toBe("M117 Layer 3 ; E2");
    expect(scanText("N7 M118 done*93")).toMatchObject({ kind: "text", words: { N: 7, M: 118 }, checksum: 93 });
    expect(scanText("M23 part.gco")).toMatchObject({ kind: "text" });
    expect(scanText("M117")).toMatchObject({ kind: "text", words: { M: 117 } });
  });

  test("a number at the start of a message is not more of the command", () => {
    expect(scanText("M117 12 M600")).toMatchObject({ kind: "text", words: { M: 117 }, commands: 1 });
    expect(scanText("M23 3.gco").words).toEqual({ M: 23 });
    expect(scanText("M106 0 S5").kind).toBe("unreadable");
  });

  test("a star in a message is a checksum only in a numbered line", () => {
    expect(scanText("M117 2*3").checksum).toBe(-1);
    expect(codeOf("M117 2*3")).toBe("M117 2*3");
    expect(scanText("N7 M117 2*3*14 ").checksum).toBe(14);
    expect(codeOf("N7 M117 2*3*14")).toBe("N7 M117 2*3");
  });

  test("named commands keep their text; a semicolon in quotes starts no comment", () => {
    expect(scanText("SET_FAN_SPEED FAN=part SPEED=0.6 ; note")).toMatchObject({ kind: "named", comment: " note" });
    expect(codeOf("  SET_PIN PIN=lamp VALUE=0.5 ; x")).toBe("SET_PIN PIN=lamp VALUE=0.5 ");
    expect(codeOf("PRINT_MSG TEXT=\"a;b\" N='c;d';e")).toBe("PRINT_MSG TEXT=\"a;b\" N='c;d'");
    expect(scanText("N4 SET_PIN PIN=lamp VALUE=1*17")).toMatchObject({ kind: "named", words: { N: 4 }, checksum: 17 });
    expect(scanText("@pause").kind).toBe("named");
    expect(scanText("_RESUME").kind).toBe("unreadable");
  });

  test("a percent sign frames a program and holds nothing", () => {
    expect(scanText("%")).toMatchObject({ kind: "blank", words: {} });
    expect(scanText("% part 12")).toMatchObject({ kind: "blank", words: {} });
  });

  test("block delete, braces, brackets, quotes and stray bytes can't be read", () => {
    for (const line of [
      "/G1 X5",
      "{if x}G1 X5",
      "[G1]",
      "G1 X[x]",
      'M106 C"fan"',
      "G1 X5 ) Y6",
      "G1 X5 \u0000",
      "\u00ff",
    ])
      expect(scanText(line).kind).toBe("unreadable");
  });

  test("blank lines are blank", () => {
    for (const line of ["", " ", "\t \t"]) expect(scanText(line)).toMatchObject({ kind: "blank", words: {}, bare: "" });
  });
});

describe("checksums", () => {
  test("are read behind the star, before a comment", () => {
    expect(scanText("N3 T0*57")).toMatchObject({ words: { N: 3, T: 0 }, checksum: 57 });
    expect(scanText("N1 G1 X2.0 Y2.0*85 ; note")).toMatchObject({ checksum: 85, comment: " note" });
    expect(scanText("N1 G1 X2 *").checksum).toBe(-1);
    expect(scanText("G1 X2 ; 4*5").checksum).toBe(-1);
  });
});

describe("ends of lines", () => {
  test.each([
    ["G1 X5\n", 6],
    ["G1 X5\r\n", 7],
    ["G1 X5\r", 6],
    ["G1 X5 \r\n", 8],
    ["G4 P5;x\r", 8],
    ["M117 x\r\n", 8],
    ["SET_PIN PIN=a VALUE=1\r\n", 23],
    ["\r\n", 2],
    ["\u00ff\r", 2],
  ])("%j takes %i bytes", (line, bytes) => {
    expect(scanText(line)).toMatchObject({ bytes, text: line.replace(/[\r\n]+$/, "") });
  });
});

test("a line of the plain shape says the same as with a blank or a comment behind it", () => {
  fc.assert(
    fc.property(moveLine, fc.constantFrom("\t", "\t ", ";", "()"), (line, behind) => {
      const { text: _, bytes, comment: __, ...plain } = scanText(line);
      const { text: ___, bytes: more, comment: ____, ...general } = scanText(line + behind);
      expect(plain).toEqual(general);
      expect(more).toBe(bytes + behind.length);
    }),
    { numRuns: 500 },
  );
});

test("what a line says does not depend on the line before it", () => {
  const line = fc.oneof(wordLine, moveLine, fc.constantFrom("M117 x*5", "SET_PIN PIN=a VALUE=1", "", ";x", "\u00ff"));
  fc.assert(
    fc.property(line, line, (before, now) => {
      const used = new LineScan();
      scanText(before, used);
      expect(scanText(now, used)).toEqual(scanText(now));
    }),
    { numRuns: 500 },
  );
});
