import { describe, expect, test } from "vitest";
import { machineWith, perLayer, profileWith } from "#tests/shared/rewrite/documents.ts";
import { type LayerLines, partLines, START, written } from "#tests/shared/rewrite/toolpath.ts";
import { linesOf, ownCommands, rowsOf, tune, tuneWhole } from "#tests/shared/rewrite/tuning.ts";

const keeps = { withinLayer: "keep-raises" };
const profile = profileWith({ fan: 0.4 }, keeps);
const machine = machineWith();

const partWith = (...layers: LayerLines[]): string => written(partLines({ layers }));
/** All fan lines of a file, ours with their tags. */
const fan = (text: string): string[] => rowsOf(text).filter((row) => /^M10[67]/.test(row));
/** What stands between the layers' markers and the fan lines: the order of a tuned file at a glance. */
const fanAndMarkers = (text: string): string[] => rowsOf(text).filter((row) => /^(M10[67]|;LAYER)/.test(row));
/** A bridge: the fan goes up, a stroke is laid, and the fan goes back. */
const bridge = (up: number, down: number): string[] => [`M106 S${up} ; bridge`, "G1 X30 Y20 E1", `M106 S${down}`];

describe("with keep-raises", () => {
  test("a raise above the plan stays as it stands, and what ends it goes back to the plan", () => {
    const text = partWith({}, { middle: bridge(255, 77) }, {});
    expect(fanAndMarkers(tune(text, machine, profile))).toEqual([
      "M106 S102 ;ql",
      ";LAYER:0",
      ";LAYER:1",
      "M106 S255 ; bridge",
      "M106 S102 ;ql=",
      ";LAYER:2",
    ]);
  });

  test("a raise that does not reach the plan goes, and so does what ends it", () => {
    expect(fan(tune(partWith({ middle: bridge(90, 20) }), machine, profile))).toEqual(["M106 S102 ;ql"]);
  });

  test("a lower duty inside a layer is no raise", () => {
    const text = written(partLines({ layers: [{ middle: ["M106 S180"] }], start: [...START, "M106 S200"] }));
    expect(fan(tune(text, machine, profile))).toEqual(["M106 S200", "M106 S102 ;ql"]);
  });

  test("a layer's own duty, set before it lays anything, is no raise", () => {
    const text = partWith({ begin: ["M106 S200"] }, { before: ["M106 S255"], middle: ["M106 S255"] });
    // The line before the second marker stands in the first layer still, and ends where the second begins.
    expect(fanAndMarkers(tune(text, machine, profile))).toEqual([
      "M106 S102 ;ql",
      ";LAYER:0",
      "M106 S255",
      "M106 S102 ;ql",
      ";LAYER:1",
    ]);
  });

  test("a raise that nothing ends in its layer ends where the next layer begins", () => {
    const text = partWith({ middle: ["M106 S255"] }, { middle: ["M106 S90"] }, {});
    expect(fanAndMarkers(tune(text, machine, profile))).toEqual([
      "M106 S102 ;ql",
      ";LAYER:0",
      "M106 S255",
      "M106 S102 ;ql",
      ";LAYER:1",
      ";LAYER:2",
    ]);
  });

  test("a raise in the last layer lasts until the end script", () => {
    const text = written(partLines({ layers: [{}, { middle: ["M106 S255"] }], finish: ["M107"] }));
    expect(fan(tune(text, machine, profile))).toEqual(["M106 S102 ;ql", "M106 S255", "M107"]);
  });

  test("raises in steps stay, each as it stands, and one return ends them", () => {
    const text = partWith({
      middle: ["M106 S150", "G1 X30 Y20 E1", "M106 S255", "G1 X30 Y22 E1", "M106 S40", "M106 S0"],
    });
    expect(fan(tune(text, machine, profile))).toEqual(["M106 S102 ;ql", "M106 S150", "M106 S255", "M106 S102 ;ql="]);
  });

  test("a raise above the limit is cut to it", () => {
    const limited = machineWith({ fan: { maxDuty: 0.87 } });
    const tuned = tune(partWith({ middle: bridge(255, 0) }), limited, profile);
    expect(fan(tuned)).toEqual(["M106 S102 ;ql", "M106 S221 ;ql+", "M106 S102 ;ql="]);
    expect(tune(tuned, limited, profile)).toBe(tuned);
  });

  test("a raise goes where the plan is at the limit already", () => {
    const limited = machineWith({ fan: { maxDuty: 0.87 } });
    const full = profileWith({ fan: 1 }, keeps);
    const tuned = tune(partWith({ middle: bridge(255, 0) }), limited, full);
    expect(fan(tuned)).toEqual(["M106 S221 ;ql"]);
  });

  test("the plan's own change inside a layer ends a raise", () => {
    const lead = profileWith({ fan: perLayer(0.4, 0.2) }, { ...keeps, lead: { "part-fan": 1 } });
    const text = partWith({ middle: ["M106 S255"], rounds: 3 }, {});
    expect(fan(tune(text, machine, lead))).toEqual(["M106 S102 ;ql", "M106 S255", "M106 S51 ;ql"]);
  });

  test("says how many raises were kept", () => {
    const text = partWith({ middle: bridge(255, 0) }, { middle: bridge(200, 0) });
    const { plan } = tuneWhole(text, machine, profile);
    expect(plan.advice.filter(({ code }) => code === "raises-kept")).toEqual([
      { layer: 1, code: "raises-kept", message: "2 raises of the fan inside layers are kept as the file has them." },
    ]);
  });

  test("the lamp's commands inside layers go all the same", () => {
    const both = profileWith({ fan: 0.4, lamp: 0.2 }, keeps);
    const text = partWith({ middle: ["M106 P2 S255", "M106 S255"] }, {});
    expect(fan(tune(text, machine, both)).filter((row) => row.includes("P2"))).toEqual([
      "M106 P2 S51 ;ql",
      "M106 P2 S0 ;ql",
    ]);
  });

  test("a raise between a pause and the next layer keeps its place among the lamp's lines", () => {
    const both = profileWith({ fan: 0.4, lamp: perLayer(0.2, 0.4) }, keeps);
    const tuned = tune(partWith({ end: ["M0", "M106 S255"] }, {}), machine, both);
    expect(fanAndMarkers(tuned).slice(3, 7)).toEqual([
      "M106 P2 S0 ;ql",
      "M106 P2 S102 ;ql",
      "M106 S255",
      "M106 S102 ;ql",
    ]);
    expect(tune(tuned, machine, both)).toBe(tuned);
  });

  test("tuning again finds the raises though what they rose from is gone", () => {
    // With the lead the plan falls in the middle of the layer; what the file had before the raise was lower still.
    const lead = profileWith({ fan: perLayer(0.6, 0.2) }, { ...keeps, lead: { "part-fan": 3 } });
    const text = partWith({ begin: ["M106 S10"], rounds: 3, end: ["M106 S90", "G1 X20 Y30 E1"] }, {});
    const tuned = tune(text, machine, lead);
    expect(linesOf(tuned)).toContain("M106 S90\n");
    expect(tune(tuned, machine, lead)).toBe(tuned);
  });
});

test("with replace every command inside the window goes", () => {
  const text = partWith({ middle: bridge(255, 0) }, { middle: ["M106 S200"] });
  expect(fan(tune(text, machine, profileWith({ fan: 0.4 })))).toEqual(["M106 S102 ;ql"]);
});

test("raises that were kept go when another profile replaces them", () => {
  const limited = machineWith({ fan: { maxDuty: 0.87 } });
  const text = partWith({ middle: bridge(255, 0) }, { middle: bridge(200, 0) });
  const replaces = profileWith({ fan: 0.6 });
  const tuned = tune(tune(text, limited, profile), limited, replaces);
  expect(ownCommands(tuned)).toEqual(["M106 S153"]);
  expect(tuned).toBe(tune(text, limited, replaces));
});
