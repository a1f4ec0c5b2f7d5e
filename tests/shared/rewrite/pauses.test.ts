import { describe, expect, test } from "vitest";
import { machineWith, perLayer, profileWith } from "#tests/shared/rewrite/documents.ts";
import { type LayerLines, partLines, START, written } from "#tests/shared/rewrite/toolpath.ts";
import { ownCommands, placesOf, refusalOf, rowsOf, tune } from "#tests/shared/rewrite/tuning.ts";

const machine = machineWith();
const steady = profileWith({ lamp: 0.4 });
const rising = profileWith({ lamp: perLayer(0.2, 0.4, 0.6, 0.8) });

const partWith = (...layers: LayerLines[]): string => written(partLines({ layers }));
/** Each command of the lamp with its neighbours among the file's own lines. */
const lamp = (text: string): string[] =>
  placesOf(text, /P2/).map(({ after, command, before }) => `${after} | ${command.slice(8)} | ${before}`);
const FIRST = "G92 E0 | S102 | ;LAYER:0";
const LAST = "G1 X30 Y30 E1 | S0 | G0 Z40";

describe("at a pause that blocks", () => {
  test("the lamp is idle before it and lit again directly behind it", () => {
    expect(lamp(tune(partWith({ middle: ["M0"] }), machine, steady))).toEqual([
      FIRST,
      "G1 X30 Y10 E1 F1200 | S0 | M0",
      "M0 | S102 | G1 X30 Y30 E1",
      LAST,
    ]);
  });

  test("a message, lower case and a number make no difference", () => {
    expect(ownCommands(tune(partWith({ middle: ["m0 Press the button"] }), machine, steady))).toHaveLength(4);
    const numbered = written(partLines({ layers: [{ middle: ["M0 Press"] }] }), { numberedFrom: 1 });
    expect(ownCommands(tune(numbered, machine, steady))).toHaveLength(4);
  });

  test("the duty is the one wanted then: at a layer's start the new layer's, once", () => {
    expect(lamp(tune(partWith({}, { before: ["M0"] }), machine, rising))).toEqual([
      "G92 E0 | S51 | ;LAYER:0",
      "G1 X30 Y30 E1 | S0 | M0",
      "M0 | S102 | ;LAYER:1",
      LAST,
    ]);
  });

  test("a file's own lamp line behind it changes nothing", () => {
    const text = partWith({}, { before: ["M0", "M106 P2 S90"] });
    const tuned = tune(text, machine, rising);
    expect(lamp(tuned)).toEqual(lamp(tune(partWith({}, { before: ["M0"] }), machine, rising)));
    expect(tune(tuned, machine, rising)).toBe(tuned);
  });

  test("what falls due while it lasts is in force behind it", () => {
    const lead = profileWith({ lamp: perLayer(0.2, 0.4) }, { lead: { lamp: 0.5 } });
    expect(lamp(tune(partWith({ end: ["M0"] }, {}), machine, lead))[2]).toBe("M0 | S102 | ;LAYER:1");
  });

  test("two in a row leave no light between them", () => {
    expect(lamp(tune(partWith({ middle: ["M0", "M0"] }), machine, steady))).toEqual([
      FIRST,
      "G1 X30 Y10 E1 F1200 | S0 | M0",
      "M0 | S102 | G1 X30 Y30 E1",
      LAST,
    ]);
  });

  test("a lamp with a largest change per second falls at once and climbs again behind it", () => {
    const slow = machineWith({ lamp: { maxDutyPerS: 0.2 } });
    const text = partWith({ rounds: 4, middle: ["M0"] });
    expect(ownCommands(tune(text, slow, steady))).toEqual([
      "M106 P2 S51",
      "M106 P2 S0",
      "M106 P2 S51",
      "M106 P2 S102",
      "M106 P2 S0",
    ]);
  });
});

describe("at a pause that does not block", () => {
  test("the lamp stays idle until the next layer", () => {
    expect(lamp(tune(partWith({ middle: ["M600"] }, {}), machine, steady))).toEqual([
      FIRST,
      "G1 X30 Y10 E1 F1200 | S0 | M600",
      "G1 X30 Y30 E1 | S102 | ;LAYER:1",
      LAST,
    ]);
  });

  test("no lead and no staircase lights it before that", () => {
    const text = partWith({ middle: ["M600"], rounds: 5 }, { rounds: 5 });
    const early = profileWith({ lamp: perLayer(0.4, 0.6) }, { lead: { lamp: 2 } });
    expect(lamp(tune(text, machine, early))[2]).toBe("G1 X30 Y30 E1 | S153 | ;LAYER:1");
    const slow = machineWith({ lamp: { maxDutyPerS: 0.2 } });
    expect(lamp(tune(text, slow, steady)).slice(-3)).toEqual([
      "G1 X30 Y30 E1 | S51 | ;LAYER:1",
      "G1 X30 Y30 E1 | S102 | G0 X10 Y10 F6000",
      LAST,
    ]);
  });

  test("a pause in the same layer that blocks does not light it either", () => {
    const text = partWith({ middle: ["M600"], end: ["M0"] }, {});
    expect(lamp(tune(text, machine, steady)).slice(1)).toEqual([
      "G1 X30 Y10 E1 F1200 | S0 | M600",
      "M0 | S102 | ;LAYER:1",
      LAST,
    ]);
    const between = partWith({ middle: ["M600", "G1 X30 Y20 E1", "M0"] }, {});
    expect(lamp(tune(between, machine, steady))[2]).toBe("G1 X30 Y30 E1 | S102 | ;LAYER:1");
  });

  test("in the last layer it stays idle to the end", () => {
    expect(ownCommands(tune(partWith({}, { middle: ["M600"] }), machine, steady))).toEqual([
      "M106 P2 S102",
      "M106 P2 S0",
      "M106 P2 S0",
    ]);
  });
});

describe("the idle duty", () => {
  test("is what the lamp falls back to, never more than that", () => {
    // 0.1 of 255 steps is 25.5.
    const idling = machineWith({ lamp: { idleDuty: 0.1 } });
    expect(ownCommands(tune(partWith({ middle: ["M0"] }), idling, steady))).toEqual([
      "M106 P2 S102",
      "M106 P2 S25",
      "M106 P2 S102",
      "M106 P2 S0",
    ]);
  });

  test("lights no lamp that is below it", () => {
    const idling = machineWith({ lamp: { idleDuty: 0.5 } });
    expect(ownCommands(tune(partWith({ middle: ["M0"] }), idling, steady))).toEqual(["M106 P2 S102", "M106 P2 S0"]);
  });
});

test("the fan goes on as planned through a pause", () => {
  const text = partWith({ middle: ["M0"] }, { middle: ["M600"] });
  const tuned = tune(text, machine, profileWith({ fan: perLayer(0.2, 0.4) }));
  expect(placesOf(tuned).map(({ command, before }) => `${command} | ${before}`)).toEqual([
    "M106 S51 | ;LAYER:0",
    "M106 S102 | ;LAYER:1",
  ]);
});

test("a pause before the first layer or behind the last is let be, listed or not", () => {
  const text = written(partLines({ layers: [{}], start: [...START, "M25", "M0"], finish: ["PAUSE", "M600"] }));
  expect(ownCommands(tune(text, machine, steady))).toEqual(["M106 P2 S102", "M106 P2 S0"]);
});

describe("a pause that the machine document does not list", () => {
  test.each(["M25", "M226", "M1", "@pause", "PAUSE"])("is refused where the lamp is driven: %s", (line) => {
    const refusal = refusalOf(() => tune(partWith({}, { middle: [line] }), machine, steady));
    expect(refusal.code).toBe("pause-unknown");
    expect(refusal.message).toContain(line.toUpperCase());
    expect(refusal.place).toEqual({ line: 16, layer: 2 });
  });

  test("is no matter where only the fan is driven", () => {
    const text = partWith({ middle: ["M25"] });
    expect(rowsOf(tune(text, machine, profileWith({ fan: 0.4 })))).toContain("M25");
  });
});

test("a pause by name is found as the machine lists it, in any case", () => {
  const named = { ...machine, pauses: [{ command: "Pause_Print", blocking: true }] };
  expect(ownCommands(tune(partWith({ middle: ["PAUSE_PRINT X=10"] }), named, steady))).toHaveLength(4);
});
