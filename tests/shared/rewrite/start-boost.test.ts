import { describe, expect, test } from "vitest";
import { machineWith, perLayer, profileWith } from "#tests/shared/rewrite/documents.ts";
import { partLines, plain, written } from "#tests/shared/rewrite/toolpath.ts";
import { ownCommands, placesOf, tune, tuneWhole } from "#tests/shared/rewrite/tuning.ts";

const boosted = machineWith({ fan: { startBoostS: 0.2 } });
/** Half a second of laying stands at each layer's end, behind a travel. */
const part = (count: number): string =>
  written(partLines({ layers: plain(count, { end: ["G0 X10 Y20 F6000", "G1 X20 Y20 E1 F1200"] }) }));
const commands = (text: string): string[] => placesOf(text).map(({ command, before }) => `${command} | ${before}`);
const left = (text: string, fan: [number, number][]) =>
  tuneWhole(text, boosted, profileWith({ fan })).plan.advice.filter(({ code }) => code === "boost-left-out");

describe("a fan that starts from standstill", () => {
  test("gets full power at a boundary before, so that the planned duty is in force in time", () => {
    const tuned = tune(part(3), boosted, profileWith({ fan: perLayer(0, 0.4, 0.4) }));
    expect(commands(tuned)).toEqual(["M106 S0 | ;LAYER:0", "M106 S255 | G0 X10 Y20 F6000", "M106 S102 | ;LAYER:1"]);
  });

  test("gets no more than its limit", () => {
    const machine = machineWith({ fan: { startBoostS: 0.2, maxDuty: 0.87 } });
    expect(ownCommands(tune(part(3), machine, profileWith({ fan: perLayer(0, 0.4) })))).toEqual([
      "M106 S0",
      "M106 S221",
      "M106 S102",
    ]);
  });

  test("needs no boost where it starts at its limit", () => {
    expect(ownCommands(tune(part(3), boosted, profileWith({ fan: perLayer(0, 1) })))).toEqual(["M106 S0", "M106 S255"]);
  });

  test("gets one at every start", () => {
    const tuned = tune(part(6), boosted, profileWith({ fan: perLayer(0, 0.4, 0.5, 0, 0, 0.4) }));
    expect(ownCommands(tuned).map((command) => Number(command.slice(6)))).toEqual([0, 255, 102, 128, 0, 255, 102]);
  });

  test("is left to the firmware at the window's start, with advice", () => {
    const fan = perLayer(0.4);
    expect(ownCommands(tune(part(3), boosted, profileWith({ fan })))).toEqual(["M106 S102"]);
    const [advice, ...more] = left(part(3), fan);
    expect(more).toEqual([]);
    expect(advice.layer).toBe(1);
    expect(advice.message).toMatch(/^part-fan starts from standstill at layer 1 without a start boost/);
  });

  test("is left to the firmware where no boundary is near, with one advice for all such layers", () => {
    // Ten seconds in one stroke: nothing nearer than the layer's beginning.
    const slow = "G1 X31 Y10 E1 F6";
    const text = written(partLines({ layers: plain(6, { middle: [slow] }) }));
    const fan = perLayer(0, 0, 0.4, 0, 0.4, 0.4);
    expect(ownCommands(tune(text, boosted, profileWith({ fan })))).not.toContain("M106 S255");
    const [advice, ...more] = left(text, fan);
    expect(more).toEqual([]);
    expect(advice.layer).toBe(3);
    expect(advice.message).toContain("at 2 layers, the first of them 3,");
  });

  test("gets none where the file had it running before the part", () => {
    const text = written(partLines({ layers: plain(2), start: ["G28", "M83", "M106 S80"] }));
    expect(left(text, perLayer(0.4))).toEqual([]);
  });
});

test("a fan that runs already gets no boost", () => {
  expect(ownCommands(tune(part(3), boosted, profileWith({ fan: perLayer(0.2, 0.4, 0.6) })))).toEqual([
    "M106 S51",
    "M106 S102",
    "M106 S153",
  ]);
});
