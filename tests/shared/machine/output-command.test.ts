import { describe, expect, test } from "vitest";
import { type Drive, parseMachine } from "#shared/formats/machine.ts";
import { LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import {
  channelsByOutput,
  dutyOn,
  namedOutput,
  numberedOutput,
  outputOf,
  parseNamed,
} from "#shared/machine/output-command.ts";
import { latin } from "#tests/helpers/reading.ts";
import { tern } from "#tests/helpers/tern.ts";

const numbered = (line: string) => {
  const scan = new LineScan();
  scanLine(latin(`${line}\n\0`), 0, scan);
  return numberedOutput(scan, scan.mWords[scan.mCount - 1]);
};
const named = (line: string) => {
  const { name, parameters } = parseNamed(line);
  return namedOutput(name, parameters);
};
const channelOn = (drive: object) => tern({ channels: [{ id: "fan", kind: "fan", drive }] }).channels[0];
const duty = (drive: object, line: string): number => dutyOn(channelOn(drive), (numbered(line) ?? named(line))!.value);

const OF_255 = { by: "fan-index", index: 0, fullScale: 255 };
const OF_1 = { by: "fan-index", index: 0, fullScale: 1 };
const PIN_255 = { by: "pin", pin: 4, fullScale: 255 };
const PIN_1 = { by: "pin", pin: 4, fullScale: 1 };

describe("G13: what a fan word means depends on the machine", () => {
  test.each([
    ["M106 S1", 1 / 255, 1],
    ["M106 S0.6", 0.6 / 255, 0.6],
    ["M106 S.35", 0.35 / 255, 0.35],
    ["M106 S127.5", 0.5, 0.5],
    ["M106 S128", 128 / 255, 128 / 255],
    ["M106 S254", 254 / 255, 254 / 255],
    ["M106 S255", 1, 1],
    ["M106 S300", 1, 1],
    ["M106 S1.5", 1.5 / 255, 1.5 / 255],
    ["M106", 1, 1],
    ["M106 S", 1, 1],
    ["M106 S0", 0, 0],
    ["M106 S-5", 0, 0],
    ["M107", 0, 0],
  ])("%s is %d of full power where that is 255, and %d where it is 1", (line, of255, of1) => {
    expect(numbered(line)).toMatchObject({ output: "fan 0", does: "duty" });
    expect(duty(OF_255, line)).toBeCloseTo(of255, 12);
    expect(duty(OF_1, line)).toBeCloseTo(of1, 12);
  });

  test.each([
    ["M42 P4 S255", 1, 1],
    ["M42 P4 S1", 1 / 255, 1],
    ["M42 P4 S0.25", 0.25 / 255, 0.25],
    ["M42 P4 S51", 0.2, 0.2],
  ])("a pin: %s is %d or %d", (line, of255, of1) => {
    expect(numbered(line)).toMatchObject({ output: "pin 4", does: "duty" });
    expect(duty(PIN_255, line)).toBeCloseTo(of255, 12);
    expect(duty(PIN_1, line)).toBeCloseTo(of1, 12);
  });

  test.each([
    ["SET_FAN_SPEED FAN=rear SPEED=0.35", { by: "named-fan", name: "rear" }, 0.35],
    ["SET_FAN_SPEED FAN=rear SPEED=1.2", { by: "named-fan", name: "rear" }, 1],
    ["SET_PIN PIN=lamp VALUE=0.5", { by: "named-pin", name: "lamp" }, 0.5],
    ["SET_PIN PIN=lamp VALUE=128", { by: "named-pin", name: "lamp", fullScale: 256 }, 0.5],
    ["SET_PIN PIN=lamp VALUE=-1", { by: "named-pin", name: "lamp" }, 0],
  ])("%s", (line, drive, value) => {
    expect(named(line)!.does).toBe("duty");
    expect(duty(drive, line)).toBeCloseTo(value, 12);
  });
});

describe("which output a line sets", () => {
  test.each([
    ["M106 S10", "fan 0"],
    ["M106 P0 S10", "fan 0"],
    ["M106 P2 S10", "fan 2"],
    ["m106p2s10", "fan 2"],
    ["M106 S10 P2", "fan 2"],
    ["N7 M106 P1 S10", "fan 1"],
    ["M107 P1", "fan 1"],
    ["M107", "fan 0"],
    ["M42 P60 S1", "pin 60"],
  ])("%s: %s", (line, output) => {
    expect(numbered(line)!.output).toBe(output);
  });

  test("names are the same in either case, and quoted or not", () => {
    for (const line of [
      "SET_FAN_SPEED FAN=rear SPEED=0.5",
      "set_fan_speed fan=REAR speed=.5",
      'SET_FAN_SPEED SPEED="0.5" FAN="rear"',
      "SET_FAN_SPEED FAN = rear SPEED = 0.5",
    ])
      expect(named(line)).toEqual({ output: "named fan REAR", value: 0.5, does: "duty" });
  });

  test("other words and names set none", () => {
    for (const line of ["M42 P4", "M42 P4 S", "M105", "M104 S200", "M141 S60", "M42 S255", "G1 X5 S10", "M900 K0.1"])
      expect(numbered(line)).toBeUndefined();
    for (const line of ["SET_PIN VALUE=1", "SET_FAN_SPEED SPEED=1", "SET_LED LED=a RED=1", "PAUSE", ""])
      expect(named(line)).toBeUndefined();
  });

  test("every kind of drive has a name of its own", () => {
    const drives: Drive[] = [
      { by: "fan-index", index: 3, fullScale: 255 },
      { by: "pin", pin: 3, fullScale: 255 },
      { by: "named-fan", name: "a" },
      { by: "named-pin", name: "a", fullScale: 1 },
    ];
    const names = drives.map((drive) => outputOf(channelOn(drive)));
    expect(names).toEqual(["fan 3", "pin 3", "named fan A", "named pin A"]);
    expect([...channelsByOutput(tern())]).toEqual([
      ["fan 0", 0],
      ["fan 2", 1],
    ]);
    expect(channelsByOutput(parseMachine({ ...tern(), channels: [] })).size).toBe(0);
  });
});

describe("lines that do more than set a duty", () => {
  test.each(["M106 P1 L0.2", "M106 P2 X0.8", "M106 P1 B0.1 F25000", "M106 H1 T45", "M106 P0 I1 R30"])(
    "%s carries configuration or more, and no duty",
    (line) => {
      expect(numbered(line)).toMatchObject({ value: Number.NaN });
      expect(numbered(line)!.does).not.toBe("duty");
    },
  );

  test("letters of configuration alone are configuration", () => {
    expect(numbered("M106 P2 X0.8 L0.2")).toEqual({ output: "fan 2", value: Number.NaN, does: "configuration" });
    expect(dutyOn(channelOn(OF_255), Number.NaN)).toBeNaN();
  });

  test.each([
    ["M106 P1 S128 T2", 128],
    ["M106 S128 X0.9", 128],
    ["M106 S1 S2", 2],
    ["M107 T1", 0],
    ["G1 X5 M106 S9", 9],
    ["M106 S255 M107", 0],
    ["M107 P1 P2", 0],
    ["M106 P1.5 S3", Number.NaN],
    ["M42 P4 S1 T1", 1],
  ])("%s cannot be taken out safely: it is more than a duty", (line, value) => {
    const command = numbered(line)!;
    expect(command.value).toBe(value);
    expect(command.does).toBe("mixed");
  });

  test.each([
    "SET_FAN_SPEED FAN=rear SPEED={speed}",
    "SET_FAN_SPEED FAN=rear SPEED=",
    "SET_FAN_SPEED FAN=rear",
    "SET_PIN PIN=lamp VALUE=0.5 CYCLE_TIME=0.1",
    'SET_PIN PIN=lamp VALUE="a b"',
  ])("%s hides its duty or says more", (line) => {
    expect(named(line)!.does).toBe("mixed");
  });

  test("a hidden duty is no number", () => {
    for (const line of ["SET_PIN PIN=lamp VALUE={x}", "SET_PIN PIN=lamp VALUE=", "SET_PIN PIN=lamp"])
      expect(named(line)!.value).toBeNaN();
    expect(named("SET_PIN PIN=lamp VALUE=0.5 CYCLE_TIME=0.1")!.value).toBe(0.5);
  });
});

test("a named command is taken apart into its name and parameters, in capitals, quotes off", () => {
  const { name, parameters } = parseNamed("start_print Extruder=210 bed='60' NOTE=\"a = b; c\" _x=1 =5");
  expect(name).toBe("START_PRINT");
  expect([...parameters]).toEqual([
    ["EXTRUDER", "210"],
    ["BED", "60"],
    ["NOTE", "a = b; c"],
    ["_X", "1"],
  ]);
  expect(parseNamed("@pause").name).toBe("@PAUSE");
  expect(parseNamed("").name).toBe("");
});
