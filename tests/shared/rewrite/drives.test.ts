import { describe, expect, test } from "vitest";
import { machineWith, perLayer, profileWith } from "#tests/shared/rewrite/documents.ts";
import { type LayerLines, partLines, plain, written } from "#tests/shared/rewrite/toolpath.ts";
import { ownCommands, refusalOf, rowsOf, tune } from "#tests/shared/rewrite/tuning.ts";

const partWith = (...layers: LayerLines[]): string => written(partLines({ layers }));

describe.each([
  ["fan index 0 on 0-255", { by: "fan-index", index: 0, fullScale: 255 }, ["M106 S0", "M106 S128", "M106 S255"]],
  ["fan index 0 on 0-1", { by: "fan-index", index: 0, fullScale: 1 }, ["M106 S0.0", "M106 S0.5", "M106 S1.0"]],
  [
    "fan index 3 on 0-255",
    { by: "fan-index", index: 3, fullScale: 255 },
    ["M106 P3 S0", "M106 P3 S128", "M106 P3 S255"],
  ],
  ["fan index 3 on 0-1", { by: "fan-index", index: 3, fullScale: 1 }, ["M106 P3 S0.0", "M106 P3 S0.5", "M106 P3 S1.0"]],
  ["a pin on 0-255", { by: "pin", pin: 9, fullScale: 255 }, ["M42 P9 S0", "M42 P9 S128", "M42 P9 S255"]],
  ["a pin on 0-1", { by: "pin", pin: 9, fullScale: 1 }, ["M42 P9 S0.0", "M42 P9 S0.5", "M42 P9 S1.0"]],
  [
    "a named fan",
    { by: "named-fan", name: "part" },
    ["SET_FAN_SPEED FAN=part SPEED=0", "SET_FAN_SPEED FAN=part SPEED=0.5", "SET_FAN_SPEED FAN=part SPEED=1"],
  ],
  [
    "a named pin on 0-1",
    { by: "named-pin", name: "blower", fullScale: 1 },
    ["SET_PIN PIN=blower VALUE=0", "SET_PIN PIN=blower VALUE=0.5", "SET_PIN PIN=blower VALUE=1"],
  ],
  [
    "a named pin on 0-255",
    { by: "named-pin", name: "blower", fullScale: 255 },
    ["SET_PIN PIN=blower VALUE=0", "SET_PIN PIN=blower VALUE=127.5", "SET_PIN PIN=blower VALUE=255"],
  ],
])("%s", (_, drive, commands) => {
  const machine = machineWith({ fan: { drive } });
  const profile = profileWith({ fan: perLayer(0, 0.5, 1) });
  const text = partWith({ middle: [commands[1]] }, { begin: [commands[2]] }, { middle: [commands[0], commands[1]] });

  test("is set in its own form, and the file's commands for it are taken out", () => {
    const tuned = tune(text, machine, profile);
    expect(ownCommands(tuned)).toEqual(commands);
    expect(rowsOf(tuned).filter((row) => commands.includes(row))).toEqual([]);
  });

  test("is found again in the tuned file", () => {
    const tuned = tune(text, machine, profile);
    expect(tune(tuned, machine, profile)).toBe(tuned);
  });
});

test("a duty is rounded down where the nearest step would pass the limit", () => {
  const machine = machineWith({ fan: { maxDuty: 0.87 }, lamp: { maxDuty: 0.83 } });
  expect(ownCommands(tune(partWith({}), machine, profileWith({ fan: 1, lamp: 1 })))).toEqual([
    "M106 S221",
    "M106 P2 S211",
    "M106 P2 S0",
  ]);
});

test("fan index 0 is set by lines with P0, without P, and by the off command", () => {
  const lines = ["M106 S128", "M106 P0 S90", "m106s77", "M106", "M107", "M107 P0", "M106 P0 S1 ; bridge"];
  const tuned = tune(partWith({ middle: lines }), machineWith(), profileWith({ fan: 0.4 }));
  expect(rowsOf(tuned).filter((row) => /^m10[67]/i.test(row))).toEqual(["M106 S102 ;ql"]);
});

test("lines of other outputs stay", () => {
  const lines = ["M106 P1 S90", "M106 P7 S120", "M107 P7", "M106 P2 S77", "M42 P0 S1", "SET_PIN PIN=lamp VALUE=1"];
  const file = partWith({ middle: lines, end: ["M106 P2 S0"] });
  const tuned = tune(file, machineWith(), profileWith({ fan: 0.4 }));
  for (const line of lines) expect(rowsOf(tuned)).toContain(line);
});

test("lines that configure a fan stay, on driven channels too", () => {
  const lines = ["M106 P0 L0.3", "M106 P2 X200 B0.1", "M106 P2 H1 T45:60"];
  const tuned = tune(partWith({ middle: lines.slice(0, 2) }), machineWith(), profileWith({ fan: 0.4, lamp: 0.2 }));
  for (const line of lines.slice(0, 2)) expect(rowsOf(tuned)).toContain(line);
});

describe("a line that sets a duty and something else besides", () => {
  const fanAndLamp = profileWith({ fan: 0.4, lamp: 0.2 });
  const named = machineWith({
    fan: { drive: { by: "named-fan", name: "part" } },
    lamp: { drive: { by: "named-pin", name: "lamp" } },
  });

  test.each([
    ["M106 P2 S128 B0.5", machineWith(), "lamp"],
    ["M106 S128 T0", machineWith(), "part-fan"],
    ["G1 X20 E1 M106 S255", machineWith(), "part-fan"],
    ["SET_PIN PIN=lamp VALUE=0.5 CYCLE_TIME=0.1", named, "lamp"],
    ['SET_FAN_SPEED FAN=part SPEED="{params.S}"', named, "part-fan"],
  ])("is refused inside the window: %s", (line, machine, id) => {
    const refusal = refusalOf(() => tune(partWith({}, { middle: [line] }), machine, fanAndLamp));
    expect(refusal.code).toBe("mixed-command");
    expect(refusal.message).toContain(id);
    expect(refusal.place).toEqual({ line: 16, layer: 2 });
  });

  test("is let be before the first layer, and on a channel that is not driven", () => {
    const line = "M106 P2 S0 B0.5";
    const before = written(partLines({ layers: plain(2), start: ["G28", "M83", line] }));
    expect(rowsOf(tune(before, machineWith(), fanAndLamp))).toContain(line);
    const inside = partWith({ middle: [line] }, { end: ["M106 P2 S0"] });
    expect(rowsOf(tune(inside, machineWith(), profileWith({ fan: 0.4 })))).toContain(line);
  });
});
