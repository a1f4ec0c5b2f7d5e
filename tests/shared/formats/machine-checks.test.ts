import { describe, expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { type Json, problemsOf, tern } from "#tests/shared/formats/documents.ts";

/** Problems of the example machine after it was spoilt. */
function problems(spoil: (machine: Json) => void): string[] {
  const machine = tern();
  spoil(machine);
  return problemsOf(() => parseMachine(machine));
}

describe("names", () => {
  test.each([
    ["line break", "Tern\nM106 S255"],
    ["carriage return", "Tern\rM106"],
    ["Unicode line separator", "Tern\u2028M106"],
    ["next-line control", "Tern\u0085M106"],
    ["NUL", "Tern\0"],
    ["text that reorders", "Tern\u202e"],
    ["half a surrogate pair", "Tern\ud800"],
    ["nothing but spaces", "   "],
    ["too long", "x".repeat(121)],
  ])("of machines cannot carry a %s", (_, name) => {
    expect(problems((machine) => Object.assign(machine, { name }))[0]).toMatch(/^name: /);
  });

  test("of machines may use any script", () => {
    expect(parseMachine({ ...tern(), name: "Seeschwalbe Ö — №2 燕鷗" }).name).toBe("Seeschwalbe Ö — №2 燕鷗");
  });

  test.each([
    "Part-Fan",
    "part fan",
    "part_fan",
    "-fan",
    "fan-",
    "1fan",
    "",
    "constructor",
    "__proto__",
    "x".repeat(41),
  ])("of channels are kebab-case: %j is refused", (id) => {
    expect(problems((machine) => Object.assign(machine.channels[0], { id }))[0]).toMatch(
      /^channels\[0\]\.id: is no channel id/,
    );
  });

  test.each(["lamp pin", "lamp=1", "lamp\nM112", "lamp;", '"lamp"', "1lamp", "", "lampe é"])(
    "of outputs cannot break out of a command: %j is refused",
    (name) => {
      const [problem] = problems((machine) => Object.assign(machine.channels[0], { drive: { by: "named-fan", name } }));
      expect(problem).toMatch(/^channels\[0\]\.drive\.name: cannot stand in a command/);
    },
  );

  test.each(["M0 S1", "", ";pause", "M600\n"])("of pauses are one word: %j is refused", (command) => {
    expect(problems((machine) => Object.assign(machine.pauses[0], { command }))[0]).toMatch(
      /^pauses\[0\]\.command: is no command/,
    );
  });
});

describe("checks across fields", () => {
  test.each<[string, (machine: Json) => void, RegExp]>([
    [
      "two channels with one id",
      (m) => (m.channels[1].id = "part-fan"),
      /^channels\[1\]\.id: "part-fan" is already the id of channels\[0\]/,
    ],
    [
      "two channels on one fan index",
      (m) => (m.channels[1].drive.index = 0),
      /^channels\[1\]\.drive: is the output of channels\[0\] \(fan-index 0\) too/,
    ],
    [
      "two channels on one fan index with different scales",
      (m) => (m.channels[1].drive = { by: "fan-index", index: 0, fullScale: 1 }),
      /^channels\[1\]\.drive: /,
    ],
    [
      "minDuty above maxDuty",
      (m) => (m.channels[1].minDuty = 0.9),
      /^channels\[1\]\.minDuty: is 0\.9, above maxDuty 0\.85/,
    ],
    [
      "idleDuty above maxDuty",
      (m) => (m.channels[1].idleDuty = 0.9),
      /^channels\[1\]\.idleDuty: is 0\.9, above maxDuty 0\.85/,
    ],
    [
      "idleDuty inside the dead band",
      (m) => Object.assign(m.channels[1], { minDuty: 0.2, idleDuty: 0.1 }),
      /^channels\[1\]\.idleDuty: is 0\.1, between off and minDuty 0\.2/,
    ],
    ["a fan with an idle duty", (m) => (m.channels[0].idleDuty = 0.5), /^channels\[0\]\.idleDuty: is for heaters/],
    [
      "a heater with a start boost",
      (m) => (m.channels[1].startBoostS = 0.5),
      /^channels\[1\]\.startBoostS: is for fans/,
    ],
    [
      "one pause command twice",
      (m) => (m.pauses[1].command = "m0"),
      /^pauses\[1\]\.command: "m0" is listed already at pauses\[0\]/,
    ],
  ])("%s: refused", (_, spoil, line) => {
    const lines = problems(spoil);
    expect(lines).toHaveLength(1);
    expect(lines[0]).toMatch(line);
  });

  test("names of outputs are compared without case, but a fan and a pin may share a name", () => {
    const drives =
      (...names: [string, string][]) =>
      (machine: Json) =>
        names.forEach(([by, name], i) => {
          machine.channels[i].drive = { by, name };
        });
    expect(problems(drives(["named-fan", "part"], ["named-fan", "PART"]))[0]).toMatch(/^channels\[1\]\.drive/);
    const machine = tern();
    drives(["named-fan", "lamp"], ["named-pin", "lamp"])(machine);
    expect(parseMachine(machine).channels).toHaveLength(2);
  });
});
