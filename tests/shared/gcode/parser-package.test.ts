import fc from "fast-check";
import { GCodeLineStream, parseLine } from "gcode-parser";
import { describe, expect, test, vi } from "vitest";
import { LineFeeder } from "#shared/gcode/line-feeder.ts";
import { cutEvery, latin } from "#tests/helpers/reading.ts";
import { codeOf, gWordsOf, scanText } from "#tests/helpers/scanning.ts";
import { moveLine, wordLine } from "#tests/helpers/words.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

/** The package's answer in the shape of our scan: of a letter that stands twice the last value counts. */
function packageWords(line: string) {
  const { words, ln, cs } = parseLine(line);
  const byLetter = Object.fromEntries(words.map(([letter, value]) => [letter, value]));
  return {
    words: ln === undefined ? byLetter : { ...byLetter, N: ln },
    g: words.filter(([letter]) => letter === "G").map(([, value]) => value),
    checksum: cs ?? -1,
  };
}

function scannedWords(line: string) {
  const { words, checksum } = scanText(line);
  return { words, g: gWordsOf(line), checksum };
}

test("our scanner and the parser package agree on every line that both can express", () => {
  fc.assert(
    fc.property(fc.oneof({ weight: 3, arbitrary: wordLine }, moveLine), (line) => {
      expect(scannedWords(line)).toEqual(packageWords(line));
    }),
    { numRuns: 1000 },
  );
});

/** What the package leaves out or gets wrong, and why the reader does not stand on it. */
describe("the parser package loses", () => {
  const allLines = async (chunks: Uint8Array[]): Promise<{ line: string }[]> => {
    const stream = new GCodeLineStream();
    const lines: { line: string }[] = [];
    stream.on("data", (line: { line: string }) => lines.push(line));
    for (const chunk of chunks) stream.write(Buffer.from(chunk));
    stream.end();
    await new Promise((resolve) => stream.on("end", resolve));
    return lines;
  };

  const ourLines = (chunks: Uint8Array[]): { text: string; offset: number }[] => {
    const lines: { text: string; offset: number }[] = [];
    const feeder = new LineFeeder((buf, from, to, offset, open) =>
      lines.push({ text: Buffer.from(buf.subarray(from, open ? to - 1 : to)).toString("latin1"), offset }),
    );
    for (const chunk of chunks) feeder.push(chunk);
    feeder.end();
    return lines;
  };

  test("where a line stands in the file", async () => {
    const lines = await allLines([latin("G28\r\nG1 X5\n")]);
    expect(Object.keys(lines[1]).sort()).toEqual(["line", "words"]);
    expect(ourLines(cutEvery(latin("G28\r\nG1 X5\n"), 5))[1]).toEqual({ text: "G1 X5\n", offset: 5 });
  });

  test("blank lines, and with them the numbers of all lines behind", async () => {
    expect(await allLines([latin("G28\n\n\nG1 X5\n")])).toHaveLength(2);
    expect(ourLines(cutEvery(latin("G28\n\n\nG1 X5\n"), 1))).toHaveLength(4);
  });

  test.each([
    ["M106 S", "S"],
    ["G28 X", "X"],
    ["M84 X Y E", "EXY"],
  ])("flags without a value: %s", (line, bare) => {
    expect(parseLine(line).words).toHaveLength(1);
    expect(scanText(line).bare).toBe(bare);
  });

  test("named commands: their numbers turn into words and line numbers", () => {
    const line = "SET_FAN_SPEED FAN=fan2 SPEED=0.6";
    expect(parseLine(line)).toMatchObject({ words: [], ln: 2 });
    expect(scanText(line)).toMatchObject({ kind: "named", words: {} });
    expect(codeOf(line)).toBe(line);
  });

  test("the text of messages: it turns into words", () => {
    const line = "M117 Layer 3 of X120";
    expect(parseLine(line).words).toEqual([
      ["M", 117],
      ["R", 3],
      ["X", 120],
    ]);
    expect(scanText(line)).toMatchObject({ kind: "text", words: { M: 117 } });
    expect(codeOf(line)).toBe(line);
  });

  test("quoted text behind a semicolon", () => {
    const line = 'SET_PIN PIN="lamp;left" VALUE=0.5';
    expect(parseLine(line, { lineMode: "stripped" }).line).toBe('SET_PIN PIN="lamp');
    expect(codeOf(line)).toBe(line);
  });

  test("characters of several bytes that a chunk border cuts", async () => {
    const bytes = new TextEncoder().encode(";h\u00e4rten\n");
    const chunks = [bytes.subarray(0, 3), bytes.subarray(3)];
    expect((await allLines(chunks))[0].line).not.toContain("\u00e4");
    expect(latin(ourLines(chunks)[0].text)).toEqual(bytes);
  });

  test("numbers with a second sign or point: they come out as text", () => {
    expect(parseLine("G1 X1-2").words[1]).toEqual(["X", "1-2"]);
    expect(scanText("G1 X1-2").kind).toBe("unreadable");
  });
});
