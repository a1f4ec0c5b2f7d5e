import { describe, expect, test } from "vitest";
import { withChecksum, withNumbers } from "#tests/shared/rewrite/toolpath.ts";
import { apply } from "#tests/shared/rewrite/tuning.ts";

const OURS = "M106 S51 ;ql\n";

/** Lines, with our line put in before one of them, read as a numbered file. */
function renumbered(lines: string[], before: number, cut: number[] = []): string[] {
  const text = lines.map((line) => `${line}\n`).join("");
  const offset = lines.slice(0, before).join("\n").length + (before > 0 ? 1 : 0);
  return apply(text, [{ offset, remove: 0, insert: OURS }], { numbered: true }, cut)
    .split("\n")
    .slice(0, -1);
}

const numbered = (...lines: string[]): string[] => lines.map(withChecksum);

describe("in a numbered file", () => {
  const plain = withNumbers(
    ["G28", "; a comment", "G1 X1 E1", "", "M117 warm; up", "SET_PIN PIN=a VALUE=0.5", "M107"],
    7,
  );

  test("our line takes the next number, and all that follow move on by one, in any chunking", () => {
    const expected = [
      ...plain.slice(0, 2),
      `${withChecksum("N8 M106 S51")} ;ql`,
      ...withNumbers(["G1 X1 E1", "", "M117 warm; up", "SET_PIN PIN=a VALUE=0.5", "M107"], 9),
    ];
    expect(renumbered(plain, 2)).toEqual(expected);
    for (const cut of [[1], [2, 5], [30], [200]]) expect(renumbered(plain, 2, cut)).toEqual(expected);
  });

  test("a command of ours by name is numbered like any other", () => {
    const text = "N1 G28*18\n";
    const insert = "SET_PIN PIN=lamp VALUE=0.5 ;ql\nSET_FAN_SPEED FAN=part SPEED=0 ;ql=\n";
    expect(apply(text, [{ offset: text.length, remove: 0, insert }], { numbered: true })).toBe(
      `${text}${withChecksum("N2 SET_PIN PIN=lamp VALUE=0.5")} ;ql\n${withChecksum("N3 SET_FAN_SPEED FAN=part SPEED=0")} ;ql=\n`,
    );
  });

  test("a comment line of ours gets no number", () => {
    const insert = ';quenchline {"v":1} M106 S3 ;ql?\n';
    expect(apply("N1 G28*18\n", [{ offset: 0, remove: 0, insert }], { numbered: true })).toBe(`${insert}N1 G28*18\n`);
  });

  test("lines before the first edit stay, gaps and all", () => {
    const lines = numbered("N3 G28", "N10 G21", "N11 G90", "N12 M83");
    expect(renumbered(lines, 2)).toEqual([
      ...lines.slice(0, 2),
      `${withChecksum("N11 M106 S51")} ;ql`,
      ...numbered("N12 G90", "N13 M83"),
    ]);
  });

  test("a gap behind the first edit closes: firmware would stop there", () => {
    const lines = numbered("N1 G28", "N2 G21", "N20 G90", "N21 M83");
    expect(renumbered(lines, 1)).toEqual([
      lines[0],
      `${withChecksum("N2 M106 S51")} ;ql`,
      ...numbered("N3 G21", "N4 G90", "N5 M83"),
    ]);
  });

  test("what is taken out leaves no gap", () => {
    const lines = numbered("N1 G28", "N2 M106 S9", "N3 G90");
    const text = lines.map((line) => `${line}\n`).join("");
    const edit = { offset: lines[0].length + 1, remove: lines[1].length + 1, insert: "" };
    expect(apply(text, [edit], { numbered: true })).toBe(`${lines[0]}\n${withChecksum("N2 G90")}\n`);
  });

  test.each([
    ["with its own number and a checksum", "N2 M110 N100", withChecksum("N2 M110 N100")],
    ["by its own number alone", "N100 M110", withChecksum("N100 M110")],
    ["without a checksum", "M110 N100", "M110 N100"],
  ])("a line that sets the counter stands, and counting goes on from it: %s", (_, __, reset) => {
    const lines = [withChecksum("N1 G28"), reset, ...numbered("N101 G21", "N102 G90")];
    expect(renumbered(lines, 0).slice(1)).toEqual([withChecksum("N2 G28"), reset, ...numbered("N101 G21", "N102 G90")]);
    expect(renumbered(lines, 3).slice(2)).toEqual([
      withChecksum("N101 G21"),
      `${withChecksum("N102 M106 S51")} ;ql`,
      withChecksum("N103 G90"),
    ]);
  });

  test("lower case, blanks and leading zeros in what is kept stay; the number is written plainly", () => {
    const lines = [withChecksum("N1 G28"), withChecksum(" n 007  g1 x1"), withChecksum("N8\tG90 ")];
    expect(renumbered(lines, 0).slice(1)).toEqual([
      withChecksum("N2 G28"),
      withChecksum(" n 3  g1 x1"),
      withChecksum("N4\tG90 "),
    ]);
  });

  test("comments behind a checksum stay", () => {
    const lines = [`${withChecksum("N1 G28")} ; home`, `${withChecksum("N2 G1 X1")};here (it) * is`];
    expect(renumbered(lines, 0).slice(1)).toEqual([
      `${withChecksum("N2 G28")} ; home`,
      `${withChecksum("N3 G1 X1")};here (it) * is`,
    ]);
  });

  test("a line without a checksum is no numbered line", () => {
    const lines = [withChecksum("N1 G28"), "N2 G21", "G90"];
    expect(renumbered(lines, 0).slice(2)).toEqual(["N2 G21", "G90"]);
  });

  test("an open last line stays open", () => {
    const lines = numbered("N1 G28", "N2 G90");
    const text = lines.join("\r\n");
    expect(apply(text, [{ offset: 0, remove: 0, insert: "M106 S51 ;ql\r\n" }], { numbered: true })).toBe(
      `${withChecksum("N1 M106 S51")} ;ql\r\n${withChecksum("N2 G28")}\r\n${withChecksum("N3 G90")}`,
    );
  });
});
