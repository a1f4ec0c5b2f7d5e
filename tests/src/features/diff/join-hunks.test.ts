import { expect, test } from "vitest";
import { joinHunks } from "#src/features/diff/join-hunks.ts";

const hunk = (firstLine: number, original: string, tuned: string) => ({
  original: { firstLine, text: original },
  tuned: { firstLine: firstLine + 1, text: tuned },
});

test("a layer's lines have the numbers that they have in their files", () => {
  const { original, tuned } = joinHunks([hunk(7, "G1 X1\r\nM107\r\n", "G1 X1\r\n")]);
  expect(original).toEqual({ text: "G1 X1\nM107", lineNumbers: ["7", "8"] });
  expect(tuned).toEqual({ text: "G1 X1", lineNumbers: ["8"] });
});

test("between hunks stands a line without a number, the same on both sides", () => {
  const { original, tuned } = joinHunks([hunk(7, "a\nb\n", "a\n"), hunk(90, "c", "c\n\nd")]);
  expect(original).toEqual({ text: "a\nb\n… 81 lines alike\nc", lineNumbers: ["7", "8", "", "90"] });
  expect(tuned).toEqual({ text: "a\n… 81 lines alike\nc\n\nd", lineNumbers: ["8", "", "91", "92", "93"] });
});

test("a side may have no lines at all", () => {
  const { original, tuned } = joinHunks([hunk(3, "", "M106 S4 ;ql\n")]);
  expect(original).toEqual({ text: "", lineNumbers: [] });
  expect(tuned.lineNumbers).toEqual(["4"]);
});

test("long stretches without a change are one line that says how many are alike", () => {
  const lines = Array.from({ length: 40 }, (_, n) => `G1 X${n}`);
  const tuned = [...lines.slice(0, 20), "M106 S31 ;ql", ...lines.slice(21)];
  const sides = joinHunks([hunk(1, lines.join("\n"), tuned.join("\n"))]);
  expect(sides.original.text.split("\n")).toEqual(["… 16 lines alike", ...lines.slice(16, 25), "… 15 lines alike"]);
  expect(sides.tuned.text.split("\n").slice(5, 7)).toEqual(["M106 S31 ;ql", "G1 X21"]);
  expect(sides.original.lineNumbers.slice(0, 2)).toEqual(["", "17"]);
});
