import { describe, expect, test } from "vitest";
import { machineWith, perLayer, profileWith } from "#tests/shared/rewrite/documents.ts";
import { partLines, plain, START, written } from "#tests/shared/rewrite/toolpath.ts";
import { isProvenance, ownCommands, placesOf, rowsOf, tune, tuneWhole } from "#tests/shared/rewrite/tuning.ts";

const part = (count: number, each = {}): string => written(partLines({ layers: plain(count, each) }));
const LAY = "G1 X30 Y10 E1 F1200";
const ROUND = "G0 X10 Y10 F6000";

describe("the window's start", () => {
  test("holds the provenance line and the first commands, before the first marker", () => {
    const rows = rowsOf(tune(part(2), machineWith(), profileWith({ fan: 0.4, lamp: 0.2 })));
    expect(isProvenance(rows[START.length])).toBe(true);
    expect(rows.slice(START.length + 1, START.length + 4)).toEqual(["M106 S102 ;ql", "M106 P2 S51 ;ql", ";LAYER:0"]);
  });

  test("lies before the first laying move where the file has no markers", () => {
    const text = written(partLines({ layers: plain(2), marker: () => undefined }));
    const rows = rowsOf(tune(text, machineWith(), profileWith({ fan: 0.4 })));
    expect(rows.slice(START.length, START.length + 4)).toEqual([
      "G0 X10 Y10 Z0.2 F6000",
      expect.stringMatching(/^;quenchline \{/),
      "M106 S102 ;ql",
      LAY,
    ]);
  });

  test("holds the first command even where the start script has set the same duty", () => {
    const text = written(partLines({ layers: plain(1), start: [...START, "M106 S102"] }));
    expect(ownCommands(tune(text, machineWith(), profileWith({ fan: 0.4 })))).toEqual(["M106 S102"]);
  });

  test("holds the first layer's command whatever the lead, behind a pause as well", () => {
    const text = written(partLines({ layers: [{ begin: ["M0", "G4 P5000"] }, {}] }));
    const tuned = tune(text, machineWith(), profileWith({ fan: 0.4, lamp: 0.2 }, { lead: { "part-fan": 1, lamp: 1 } }));
    expect(placesOf(tuned, /P2/).map(({ command, before }) => `${command} | ${before}`)).toEqual([
      "M106 P2 S51 | ;LAYER:0",
      "M106 P2 S0 | M0",
      "M106 P2 S51 | G4 P5000",
      "M106 P2 S0 | G0 Z40",
    ]);
    expect(placesOf(tuned, /M106 S/)).toHaveLength(1);
  });
});

test("a command is written only where the duty changes", () => {
  const tuned = tune(part(6), machineWith(), profileWith({ fan: perLayer(0.2, 0.2, 0.4, 0.4, 0.4, 0.2) }));
  expect(placesOf(tuned).map(({ command, before }) => `${command} | ${before}`)).toEqual([
    "M106 S51 | ;LAYER:0",
    "M106 S102 | ;LAYER:2",
    "M106 S51 | ;LAYER:5",
  ]);
});

describe("a lead", () => {
  const profile = (lead: number | "settle") => profileWith({ fan: perLayer(0.2, 0.4) }, { lead: { "part-fan": lead } });
  // A round of 2.4 s: 0.35 s of travel, then two sides of a second each.
  const text = part(2, { rounds: 3 });
  const second = (tuned: string) => placesOf(tuned)[1];

  test("of nothing puts the command before the layer's marker", () => {
    expect(second(tune(text, machineWith(), profile(0)))).toEqual({
      after: "G1 X30 Y30 E1",
      command: "M106 S102",
      before: ";LAYER:1",
    });
  });

  test("that falls inside a layer snaps back to the travel before it", () => {
    const rows = rowsOf(tune(text, machineWith(), profile(1)));
    const at = rows.indexOf("M106 S102 ;ql");
    expect(rows[at + 1]).toBe(ROUND);
    expect(rows.slice(at).indexOf(";LAYER:1")).toBe(4);
  });

  test("is a shift in time: the duty is in force that long before its layer, and not a travel longer", () => {
    const leadS = 3;
    const { reading, edits } = tuneWhole(text, machineWith(), profile(leadS));
    const { travels, layers } = reading;
    const at = [...travels.offset].indexOf(edits[1].offset);
    expect(travels.timeS[at]).toBeLessThanOrEqual(layers[1].startsAtS - leadS);
    expect(travels.timeS[at + 1]).toBeGreaterThan(layers[1].startsAtS - leadS);
  });

  test("of half the settle time is what the profile calls settle", () => {
    const machine = machineWith({ fan: { settleS: 6 } });
    const half = profileWith({ fan: perLayer(0.2, 0.4) }, { lead: { "part-fan": 3 }, name: "Seal ring" });
    expect(ownAt(tune(text, machine, profile("settle")))).toEqual(ownAt(tune(text, machine, half)));
  });

  test("is shorter by the time that an output acts ahead of the motion", () => {
    const machine = machineWith({ fan: { acts: { immediate: 2 } } });
    expect(ownAt(tune(text, machine, profile(3)))).toEqual(ownAt(tune(text, machineWith(), profile(1))));
    expect(second(tune(text, machine, profile(1.5))).before).toBe(";LAYER:1");
  });

  test("spans layers", () => {
    // Layers of 2.4 s: four seconds lie in the layer before the one below.
    const tuned = tune(
      part(6),
      machineWith(),
      profileWith({ fan: perLayer(0.2, 0.2, 0.2, 0.2, 0.4) }, { lead: { "part-fan": 4 } }),
    );
    expect(second(tuned)).toEqual({ after: ";LAYER:2", command: "M106 S102", before: "G0 X10 Y10 Z0.6 F6000" });
  });

  test("never reaches before the window: of the layers that fall on its start the last one stands", () => {
    const duties = [0.1, 0.2, 0.3, 0.4, 0.5, 0.6];
    const lead = { "part-fan": 6 };
    const tuned = tune(part(6), machineWith(), profileWith({ fan: perLayer(...duties) }, { lead }));
    // Layer 4 begins 7.1 s behind the first one: six seconds before that, layer 1 has not met a travel yet.
    expect(placesOf(tuned).map(({ command, before }) => `${command} | ${before}`)).toEqual([
      "M106 S102 | ;LAYER:0",
      "M106 S128 | G0 X10 Y10 Z0.4 F6000",
      "M106 S153 | G0 X10 Y10 Z0.6 F6000",
    ]);
    const long = tune(part(6), machineWith(), profileWith({ fan: perLayer(...duties) }, { lead: { "part-fan": 300 } }));
    expect(ownCommands(long)).toEqual(["M106 S153"]);
  });
});

/** Our commands, each with the number of the file's own lines before it. */
function ownAt(tuned: string): string[] {
  let before = 0;
  return rowsOf(tuned).flatMap((row) => {
    if (row.endsWith(";ql")) return [`${before} ${row}`];
    if (!isProvenance(row)) before++;
    return [];
  });
}

test("bed layers have their own duty, at the bed of every object printed one after the other", () => {
  const layers = [...plain(3), { zMm: 0.2 }, {}, {}];
  const profile = profileWith({ lamp: 0.6 }, { bedLayers: { count: 1, duty: { lamp: 0.4 } } });
  const tuned = tune(written(partLines({ layers })), machineWith(), profile);
  expect(placesOf(tuned).map(({ command, before }) => `${command} | ${before}`)).toEqual([
    "M106 P2 S102 | ;LAYER:0",
    "M106 P2 S153 | ;LAYER:1",
    "M106 P2 S102 | ;LAYER:3",
    "M106 P2 S153 | ;LAYER:4",
    "M106 P2 S0 | G0 Z40",
  ]);
});

test("the lamp steps down to idle over the last millimetres and is off behind the part", () => {
  const profile = profileWith({ lamp: 0.6 }, { limits: { lamp: { endRampMm: 0.6 } } });
  const tuned = tune(part(6), machineWith({ lamp: { idleDuty: 0.2 } }), profile);
  expect(placesOf(tuned).map(({ command, before }) => `${command} | ${before}`)).toEqual([
    "M106 P2 S153 | ;LAYER:0",
    "M106 P2 S119 | ;LAYER:3",
    "M106 P2 S85 | ;LAYER:4",
    "M106 P2 S51 | ;LAYER:5",
    "M106 P2 S0 | G0 Z40",
  ]);
});

describe("the lamp's last command", () => {
  const profile = profileWith({ lamp: 0.6 });

  test("stands directly behind the last laying move, before what the end script does", () => {
    const text = written(partLines({ layers: plain(2), finish: ["M106 P2 S0", "G0 Z40", "M106 P2 S0"] }));
    expect(rowsOf(tune(text, machineWith(), profile)).slice(-5)).toEqual([
      "G1 X30 Y30 E1",
      "M106 P2 S0 ;ql",
      "M106 P2 S0",
      "G0 Z40",
      "M106 P2 S0",
    ]);
  });

  test("stands there even where the plan is off already", () => {
    expect(ownCommands(tune(part(2), machineWith(), profileWith({ lamp: 0 })))).toEqual(["M106 P2 S0", "M106 P2 S0"]);
  });

  test("is the file's last line where nothing follows the part, with a terminator only where the file has one", () => {
    const lines = partLines({ layers: plain(2), finish: [] });
    expect(tune(written(lines), machineWith(), profile)).toMatch(/E1\nM106 P2 S0 ;ql\n$/);
    expect(tune(written(lines, { finalNewline: false }), machineWith(), profile)).toMatch(/E1\nM106 P2 S0 ;ql$/);
  });
});

test("a print wound as one rising bead takes its commands where a turn begins", () => {
  const turns = Array.from({ length: 16 }, (_, k) => {
    const [x, y] = [
      [30, 10],
      [30, 30],
      [10, 30],
      [10, 10],
    ][k % 4];
    return `G1 X${x} Y${y} Z${Math.round((0.2 + (k + 1) * 0.05) * 1000) / 1000} E1`;
  });
  const lines = partLines({ layers: [{ end: ["G1 X10 Y10 E1", ...turns] }] });
  const { reading, text } = tuneWhole(
    written(lines),
    machineWith(),
    profileWith({ fan: perLayer(0.1, 0.2, 0.3, 0.4, 0.5) }),
  );
  expect(reading.findings.map(({ code }) => code)).toContain("spiral");
  expect(reading.layers).toHaveLength(5);
  expect(placesOf(text).map(({ command, before }) => `${command} | ${before}`)).toEqual([
    "M106 S26 | ;LAYER:0",
    ...[0, 4, 8, 12].map((k, n) => `M106 S${[51, 77, 102, 128][n]} | ${turns[k]}`),
  ]);
});
