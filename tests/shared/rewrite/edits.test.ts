import { describe, expect, test } from "vitest";
import { EditList } from "#shared/rewrite/edits.ts";
import { machineWith, profileWith } from "#tests/shared/rewrite/documents.ts";
import { type Ending, partLines, plain, written } from "#tests/shared/rewrite/toolpath.ts";
import { tune } from "#tests/shared/rewrite/tuning.ts";

const CLOSED = { bytes: 100, finalNewline: true };
const OPEN = { bytes: 100, finalNewline: false };

describe("edits", () => {
  test("come out by place, whatever the order they went in; lines at one place keep theirs", () => {
    const list = new EditList();
    list.insert(40, "c");
    list.insert(10, "a");
    list.insert(40, "d");
    list.remove(20, 5);
    expect(list.end("\n", CLOSED)).toEqual([
      { offset: 10, remove: 0, insert: "a\n" },
      { offset: 20, remove: 5, insert: "" },
      { offset: 40, remove: 0, insert: "c\nd\n" },
    ]);
  });

  test("take the file's own terminator", () => {
    const list = new EditList();
    list.insert(10, "a");
    expect(list.end("\r\n", CLOSED)).toEqual([{ offset: 10, remove: 0, insert: "a\r\n" }]);
  });

  test("that touch are one", () => {
    const list = new EditList();
    list.remove(10, 5);
    list.insert(10, "a");
    list.remove(15, 5);
    list.insert(20, "b");
    list.remove(30, 5);
    expect(list.end("\n", CLOSED)).toEqual([
      { offset: 10, remove: 10, insert: "a\nb\n" },
      { offset: 30, remove: 5, insert: "" },
    ]);
  });

  test("at the end of a file whose last line is open begin with the terminator it lacks", () => {
    const list = new EditList();
    list.insert(100, "a");
    list.insert(100, "b");
    expect(list.end("\r\n", OPEN)).toEqual([{ offset: 100, remove: 0, insert: "\r\na\r\nb" }]);
  });

  test("that take out an open last line take the terminator before it, and give it back", () => {
    const list = new EditList();
    list.remove(80, 10);
    list.remove(90, 10);
    list.insert(80, "a");
    expect(list.end("\r\n", OPEN)).toEqual([{ offset: 78, remove: 22, insert: "\r\na" }]);
    const bare = new EditList();
    bare.remove(90, 10);
    expect(bare.end("\n", OPEN)).toEqual([{ offset: 89, remove: 11, insert: "" }]);
  });

  test("elsewhere in such a file are as in any other", () => {
    const list = new EditList();
    list.insert(50, "a");
    list.remove(90, 5);
    expect(list.end("\n", OPEN)).toEqual(list.end("\n", CLOSED));
  });
});

describe("a file that ends with its last laying move, open", () => {
  const machine = machineWith({
    more: [{ id: "rear-lamp", kind: "heater", drive: { by: "pin", pin: 5, fullScale: 255 } }],
  });
  const both = profileWith({ lamp: 0.2 }, {});
  const zone = both.zones[0];
  const profile = {
    ...both,
    zones: [{ ...zone, heating: [...zone.heating, { ...zone.heating[0], channel: "rear-lamp" }] }],
  };

  test.each<[string, Ending]>([
    ["line feeds", { newline: "\n" }],
    ["carriage returns and line feeds", { newline: "\r\n" }],
    ["carriage returns", { newline: "\r" }],
    ["a mixture", { newline: ["\r\n", "\n"] }],
    ["numbers", { newline: "\r\n", numberedFrom: 1 }],
  ])("is closed before our lines and open behind them, also when tuned again: %s", (_, ending) => {
    const text = written(partLines({ layers: plain(2), finish: [] }), { ...ending, finalNewline: false });
    const newline = typeof ending.newline === "string" ? ending.newline : "\n";
    const tuned = tune(text, machine, profile);
    const rows = tuned.split(newline).slice(-3);
    expect(rows[0]).toMatch(/G1 X30 Y30 E1(\*\d+)?$/);
    expect(rows[1]).toMatch(/M106 P2 S0(\*\d+)? ;ql$/);
    expect(rows[2]).toMatch(/M42 P5 S0(\*\d+)? ;ql$/);
    expect(tune(tuned, machine, profile)).toBe(tuned);
    const other = { ...profile, name: "Other" };
    expect(tune(tuned, machine, other)).toBe(tune(text, machine, other));
  });
});
