import { describe, expect, test } from "vitest";
import { machineWith, profileWith } from "#tests/shared/rewrite/documents.ts";
import { partLines, plain, START, written } from "#tests/shared/rewrite/toolpath.ts";
import { ownCommands, refusalOf, tune, tuneWhole } from "#tests/shared/rewrite/tuning.ts";

const both = profileWith({ fan: 0.4, lamp: 0.2 });
const lampAt = (drive: object) => machineWith({ lamp: { drive } });
const INDEX_2 = { by: "fan-index", index: 2, fullScale: 255 };

interface Lines {
  start?: string[];
  middle?: string[];
  finish?: string[];
}
const partWith = ({ start = [], middle = [], finish = [] }: Lines): string =>
  written(partLines({ layers: plain(2, { middle }), start: [...START, ...start], finish: ["G0 Z40", ...finish] }));

describe("a command for an output that firmware families read in different ways", () => {
  test.each([
    "M106 S255 M106 P2 S128",
    "M106 P2 S255 M84",
    "M400 M106 P2 S255",
    "M106 P2 S255 M0",
    "M2 M3 M4 M5 M6 M7 M8 M9 M106 P2 S255",
    "M106 P2 S255 #fast",
    "$SET_PIN PIN=lamp VALUE=1",
  ])("is refused wherever it stands: %s", (line) => {
    for (const place of ["start", "middle", "finish"])
      expect(refusalOf(() => tune(partWith({ [place]: [line] }), machineWith(), both))).toMatchObject({
        code: "unclear-command",
        place: { line: expect.any(Number) },
      });
  });

  test("is no reason to refuse where it drives nothing", () => {
    for (const line of ["M82 M107.5 S1", "G21 G90 M83", "M104 S200 M140 S60", "#nothing to see"])
      expect(() => tune(partWith({ start: [line] }), machineWith(), both)).not.toThrow();
  });
});

describe("a plain fan command on a machine whose fan is named", () => {
  const fan = { drive: { by: "named-fan", name: "part" } };
  const machine = machineWith({ fan });
  const text = partWith({ middle: ["M106 S255"] });

  test("is refused: it may be the same fan, changed between our lines", () => {
    const refusal = refusalOf(() => tune(text, machine, both));
    expect(refusal).toMatchObject({ code: "fan-elsewhere", place: { line: expect.any(Number) } });
    expect(refusal.message).toContain("part-fan");
  });

  test("stays where the document says what it drives, and is no matter outside the layers or where no fan is driven", () => {
    const other = { id: "aux", kind: "fan", drive: { by: "fan-index", index: 0, fullScale: 255 } };
    expect(ownCommands(tune(text, machineWith({ fan, more: [other] }), both)).length).toBeGreaterThan(0);
    expect(() => tune(partWith({ start: ["M106 S255"], finish: ["M107"] }), machine, both)).not.toThrow();
    expect(() => tune(text, machine, profileWith({ lamp: 0.2 }))).not.toThrow();
  });
});

describe("firmware that ignores the index of a fan command", () => {
  // REFERENCE G13: "M106 P2 S255" meant for a lamp drives the part fan there.
  const commands = [
    "SET_FAN_SPEED FAN=aux SPEED=0.4",
    "SET_PIN PIN=light VALUE=1",
    "SET_VELOCITY_LIMIT ACCEL=2000",
    "SET_PRESSURE_ADVANCE ADVANCE=0.04",
    "EXCLUDE_OBJECT_START NAME=ring",
    "SET_HEATER_TEMPERATURE HEATER=extruder TARGET=390",
    "TEMPERATURE_WAIT SENSOR=extruder MINIMUM=380",
    "BED_MESH_CALIBRATE",
    "SAVE_GCODE_STATE NAME=before",
  ];

  test.each(commands)("is known by its named commands, and a lamp driven by index is refused: %s", (line) => {
    const refusal = refusalOf(() => tune(partWith({ start: [line] }), lampAt(INDEX_2), both));
    expect(refusal.code).toBe("output-shared");
    expect(refusal.place).toEqual({ line: START.length + 1 });
    expect(refusal.message).toContain(line.split(" ")[0]);
    expect(refusal.message).toContain("M106 P2 would drive the part fan");
    expect(refusal.remedy).toContain("named-pin");
  });

  test("is known by a stock file's own fan commands too: those without P don't show that P is read", () => {
    const text = partWith({
      start: ["SET_VELOCITY_LIMIT ACCEL=2000", "M106 S77"],
      middle: ["M106 S255"],
      finish: ["M107"],
    });
    expect(refusalOf(() => tune(text, lampAt(INDEX_2), both)).code).toBe("output-shared");
    const zero = partWith({ start: ["SET_VELOCITY_LIMIT ACCEL=2000", "M106 P0 S77"] });
    expect(refusalOf(() => tune(zero, lampAt(INDEX_2), both)).code).toBe("output-shared");
  });

  test.each([
    ["a named pin", { by: "named-pin", name: "halogen" }, "SET_PIN PIN=halogen VALUE=0.2"],
    ["a pin", { by: "pin", pin: 4, fullScale: 255 }, "M42 P4 S51"],
  ])("may drive the lamp by %s", (_, drive, command) => {
    expect(ownCommands(tune(partWith({ start: commands }), lampAt(drive), both))).toContain(command);
  });

  test("is no matter where the profile lets the lamp alone", () => {
    const text = partWith({ start: commands });
    expect(ownCommands(tune(text, lampAt(INDEX_2), profileWith({ fan: 0.4 })))).toEqual(["M106 S102"]);
  });

  test("gives advice where the file itself uses an index: a macro must read it", () => {
    const text = partWith({ start: ["SET_VELOCITY_LIMIT ACCEL=2000", "M106 P3 S255"] });
    const { plan } = tuneWhole(text, lampAt(INDEX_2), both);
    const [advice] = plan.advice.filter(({ code }) => code === "output-shared");
    expect(advice.message).toContain("Line 9 (SET_VELOCITY_LIMIT)");
    expect(advice.message).toContain("line 10 uses P");
    expect(advice.message).toContain("lamp unplugged");
  });

  test("is not believed to read the index because of lines of ours", () => {
    const text = partWith({ start: ["G4 P1"] });
    const tuned = tune(text, lampAt(INDEX_2), both).replace("G4 P1", "SET_VELOCITY_LIMIT ACCEL=2000");
    expect(refusalOf(() => tune(tuned, lampAt(INDEX_2), both)).code).toBe("output-shared");
  });
});

describe("a lamp on fan output 0", () => {
  const machine = machineWith({
    fan: { drive: { by: "fan-index", index: 1, fullScale: 255 } },
    lamp: { drive: { by: "fan-index", index: 0, fullScale: 255 } },
  });

  test.each(["M106 S255", "M106", "M107"])("is refused where the file has a plain fan command: %s", (line) => {
    const refusal = refusalOf(() => tune(partWith({ start: [line] }), machine, both));
    expect(refusal.code).toBe("output-shared");
    expect(refusal.place).toEqual({ line: START.length + 1 });
  });

  test("is let be where every fan command names its output", () => {
    const text = partWith({ start: ["M106 P1 S255", "M106 P0 S0"], middle: ["M106 P1 S90"] });
    expect(ownCommands(tune(text, machine, both))).toEqual(["M106 P1 S102", "M106 S51", "M106 S0"]);
  });
});

describe("behind the last layer", () => {
  test.each(["M106 P2 S1", "M106 P2", "M106 P2 S9 B1", "m106p2s255"])("a lamp switched on is refused: %s", (line) => {
    const refusal = refusalOf(() => tune(partWith({ finish: [line, "M106 P2 S0"] }), machineWith(), both));
    expect(refusal.code).toBe("heater-on-after-end");
    expect(refusal.place).toEqual({ line: START.length + 10 });
  });

  test("a lamp switched off, or configured, is let be", () => {
    const text = partWith({ finish: ["M106 P2 S0", "M106 P2 L0.2", "M107 P2"] });
    expect(ownCommands(tune(text, machineWith(), both)).pop()).toBe("M106 P2 S0");
  });

  test("the fan may do as the end script likes", () => {
    const text = partWith({ finish: ["M106 S255"] });
    expect(ownCommands(tune(text, machineWith(), both))).toHaveLength(3);
  });
});

describe("a heater that the profile does not drive", () => {
  const fanOnly = profileWith({ fan: 0.4 });

  test("may not be left on by the file", () => {
    const refusal = refusalOf(() => tune(partWith({ middle: ["M106 P2 S90"] }), machineWith(), fanOnly));
    expect(refusal.code).toBe("heater-left-on");
    expect(refusal.message).toContain("lamp");
    expect(refusal.place.line).toBeGreaterThan(START.length);
  });

  test("may be on in between", () => {
    const text = partWith({ middle: ["M106 P2 S90"], finish: ["M107 P2", "M106 P2 L0.2"] });
    expect(ownCommands(tune(text, machineWith(), fanOnly))).toEqual(["M106 S102"]);
  });

  test("is not known to be off behind a line that hides its duty", () => {
    const text = partWith({ finish: ["SET_PIN PIN=halogen VALUE={off}"] });
    const machine = lampAt({ by: "named-pin", name: "halogen" });
    expect(refusalOf(() => tune(text, machine, fanOnly)).code).toBe("heater-left-on");
  });
});
