import { describe, expect, test } from "vitest";
import type { Reading } from "#shared/layers/reading.ts";
import { END, heights, marker, ring, rings, START } from "#tests/helpers/part.ts";
import { findingsOf, readText } from "#tests/helpers/reading.ts";
import { tern } from "#tests/helpers/tern.ts";

const read = (...parts: string[][]): Reading => readText([...START, ...parts.flat(), ...END]);
/** A layer whose laying moves take the same time before and after what stands between. */
const halves = (z: number, ...between: string[]): string[] => [
  `G0 X50 Y50 Z${z} F6000`,
  "G1 X80 E1 F1800",
  ...between,
  "G1 X50 E1",
];

describe("the duties that a layer saw", () => {
  test("are off until the first command", () => {
    const { layers } = read(rings(heights(2)));
    expect(layers[0].duty).toEqual({
      "part-fan": { mean: 0, min: 0, max: 0, commands: 0 },
      lamp: { mean: 0, min: 0, max: 0, commands: 0 },
    });
  });

  test("hold from one layer to the next", () => {
    const { layers } = read(rings(heights(3), (k) => (k === 1 ? ["M106 S51"] : [])));
    expect(layers.map(({ duty }) => duty["part-fan"])).toEqual([
      { mean: expect.any(Number), min: 0, max: 0.2, commands: 1 },
      { mean: 0.2, min: 0.2, max: 0.2, commands: 0 },
      { mean: 0.2, min: 0.2, max: 0.2, commands: 0 },
    ]);
  });

  test("are weighted by time, with the least, the most and the number of commands", () => {
    const { layers } = read(halves(0.2, "M106 S255"), halves(0.4, "M106 S51", "M106 S102"), halves(0.6));
    const [one, two, three] = layers.map(({ duty }) => duty["part-fan"]);
    expect(one).toMatchObject({ min: 0, max: 1, commands: 1 });
    expect(one.mean).toBeGreaterThan(0.45);
    expect(one.mean).toBeLessThan(0.6);
    expect(two).toMatchObject({ min: 0.2, max: 1, commands: 2 });
    expect(two.mean).toBeGreaterThan(0.65);
    expect(two.mean).toBeLessThan(0.75);
    expect(three).toEqual({ mean: 0.4, min: 0.4, max: 0.4, commands: 0 });
  });

  test("count what stands before a layer's marker for the layer, once it is in force there", () => {
    const { layers } = read(rings(heights(2), (k) => ["M106 S255", ...marker(k), "M106 P2 S51"]));
    expect(layers[0].duty["part-fan"]).toMatchObject({ mean: expect.closeTo(1, 12), min: 1, max: 1 });
    expect(layers[0].duty.lamp).toMatchObject({ mean: expect.closeTo(0.2, 12), min: 0.2, max: 0.2, commands: 1 });
    expect(layers[1].duty.lamp).toMatchObject({ mean: 0.2, commands: 0 });
  });

  test("leave out what hides its duty", () => {
    const { layers } = read(halves(0.2, "M106 P2 X0.5"), halves(0.4));
    expect(layers[0].duty.lamp).toEqual({ mean: 0, min: 0, max: 0, commands: 0 });
  });
});

describe("lines that drive the machine's outputs", () => {
  const lines = [
    ...START,
    "M106 P2 S10 ; before",
    ";LAYER:0",
    "M107",
    ...ring(0.2),
    "  m106s127.5 ; half",
    ";LAYER:1",
    ...ring(0.4),
    "M106 P3 S9",
    "M106 P2 L0.2",
    "N5 M106 P0 S51 T2",
    "G1 X60 E.2",
    "M107 P2",
  ];
  const reading = readText(lines);

  test("are listed in file order with channel, duty, code and the layer they stand in", () => {
    expect(reading.controls.map(({ channel, duty, does, code, layer }) => [channel, duty, does, code, layer])).toEqual([
      [1, 10 / 255, "duty", "M106 P2 S10", 0],
      [0, 0, "duty", "M107", 1],
      [0, 0.5, "duty", "m106s127.5", 1],
      [1, Number.NaN, "configuration", "M106 P2 L0.2", 2],
      [0, 0.2, "mixed", "M106 P0 S51 T2", 2],
      [1, 0, "duty", "M107 P2", Number.POSITIVE_INFINITY],
    ]);
  });

  test("know their line and their bytes, terminator included", () => {
    const text = `${lines.join("\n")}\n`;
    for (const { offset, length, line } of reading.controls)
      expect(text.slice(offset, offset + length)).toBe(`${lines[line - 1]}\n`);
  });

  test("know the print time at which they act: the end of the move before them", () => {
    const times = reading.controls.map(({ timeS }) => timeS);
    expect(times).toEqual([...times].sort((a, b) => a - b));
    expect(times[0]).toBe(0);
    expect(times[5]).toBeCloseTo(reading.window.end.timeS, 9);
    expect(times[3]).toBeLessThan(times[5]);
  });

  test("of outputs that no channel has are left alone", () => {
    expect(reading.controls.some(({ code }) => code.includes("P3"))).toBe(false);
  });

  test("inside the print are told once a channel", () => {
    const at = (text: string): number => lines.indexOf(text) + 1;
    expect(findingsOf(reading)).toEqual([
      `controls-inside ${at("M107")}`,
      `no-channel ${at("M106 P3 S9")}`,
      `controls-inside ${at("M106 P2 L0.2")}`,
    ]);
  });
});

describe("how a file addresses its outputs", () => {
  test("first lines of each way are kept", () => {
    const { outputs } = read(["M106 S5"], ring(0.2), ["M107 P1", "M106 P2 S3", "M106", "SET_GCODE_OFFSET Z=0.1"]);
    const at = START.length;
    expect(outputs).toEqual({
      bareFanLine: at + 1,
      indexedFanLine: at + 7,
      namedCommand: { name: "SET_GCODE_OFFSET", line: at + 10 },
    });
  });

  test("index 0 is neither, pins are no fans", () => {
    expect(readText([...START, ...ring(0.2), "M106 P0 S4", "M42 P4 S1"]).outputs).toEqual({});
  });

  test("our own lines don't count; one that drives no channel of this machine is noted", () => {
    const { outputs, controls } = read(["M106 P2 S9;ql"], ring(0.2), ["M106 P5 S3;ql"]);
    expect(outputs.indexedFanLine).toBeUndefined();
    expect(outputs.strayOwnLine).toBe(START.length + 7);
    expect(controls[0].ours).toBe("plan");
  });

  test("tags of our own lines are told apart", () => {
    const { controls } = read(ring(0.2), ["M106 S1;ql", "M106 S2;ql+", "M106 S3;ql=", "M106 S4 ;ql?", "M106 S5 ; ql"]);
    expect(controls.slice(0, 5).map(({ ours }) => ours)).toEqual(["plan", "raise", "restore", false, false]);
  });
});

describe("values on mixed scales are told", () => {
  const scaleOf = (line: string, channels = tern().channels as object[]): string[] =>
    findingsOf(readText([...START, ...ring(0.2), line], tern({ channels }))).filter((code) => code.startsWith("scale"));
  const of1 = [{ id: "fan", kind: "fan", drive: { by: "fan-index", index: 0, fullScale: 1 } }];

  test("a fraction where full power is 255", () => {
    expect(scaleOf("M106 S0.6")).toHaveLength(1);
    for (const line of ["M106 S0", "M106 S1", "M106 S128", "M106", "M107"]) expect(scaleOf(line)).toEqual([]);
  });

  test("a value above one where full power is 1", () => {
    expect(scaleOf("M106 S128", of1)).toHaveLength(1);
    for (const line of ["M106 S0.6", "M106 S1", "M106", "M107"]) expect(scaleOf(line, of1)).toEqual([]);
  });
});

describe("named outputs", () => {
  const machine = tern({
    channels: [
      { id: "fan", kind: "fan", drive: { by: "named-fan", name: "part_cooling" } },
      { id: "lamp", kind: "heater", drive: { by: "named-pin", name: "halogen", fullScale: 1 } },
    ],
  });

  test("are found by name, in any case", () => {
    const { controls, layers } = readText(
      [
        ...START,
        "SET_FAN_SPEED FAN=PART_COOLING SPEED=0.5",
        ...ring(0.2),
        "set_pin pin=halogen value=0.25 ; on",
        "SET_PIN PIN=other VALUE=1",
        "SET_PIN PIN=halogen VALUE={x}",
        ...ring(0.4),
      ],
      machine,
    );
    expect(controls.map(({ channel, duty, does, code }) => [channel, duty, does, code])).toEqual([
      [0, 0.5, "duty", "SET_FAN_SPEED FAN=PART_COOLING SPEED=0.5"],
      [1, 0.25, "duty", "set_pin pin=halogen value=0.25"],
      [1, Number.NaN, "mixed", "SET_PIN PIN=halogen VALUE={x}"],
    ]);
    expect(layers[1].duty.lamp).toMatchObject({ mean: 0.25 });
  });

  test("in a numbered line keep their code without number and checksum", () => {
    const { controls } = readText(["G90", "M83", ...ring(0.2), "N7 SET_PIN PIN=halogen VALUE=1 *120"], machine);
    expect(controls[0].code).toBe("SET_PIN PIN=halogen VALUE=1");
  });
});

describe("pauses", () => {
  test("are those that firmware knows and those that the machine lists", () => {
    const machine = tern({ pauses: [{ command: "MY_BREAK" }, { command: "M777" }] });
    const forms = [
      "M0",
      "M1 wait",
      "M25",
      "M226",
      "M600",
      "M601",
      "M125",
      "PAUSE",
      "@pause",
      "my_break A=1",
      "M777 S1",
    ];
    const { pauses } = readText([...START, ";LAYER:0", ...ring(0.2), ...forms, "M776", ...ring(0.4)], machine);
    expect(pauses.map(({ command }) => command)).toEqual([
      "M0",
      "M1",
      "M25",
      "M226",
      "M600",
      "M601",
      "M125",
      "PAUSE",
      "@PAUSE",
      "MY_BREAK",
      "M777",
    ]);
  });

  test("know their place, time and layer", () => {
    const lines = [...START, "M0", ";LAYER:0", ...ring(0.2), "M600 X0", "M0 Change", ...ring(0.4), "M0"];
    const { pauses, layers } = readText(lines);
    const text = `${lines.join("\n")}\n`;
    for (const { offset, length, line } of pauses)
      expect(text.slice(offset, offset + length)).toBe(`${lines[line - 1]}\n`);
    expect(pauses.map(({ layer }) => layer)).toEqual([0, 1, 1, Number.POSITIVE_INFINITY]);
    expect(pauses[0].timeS).toBe(0);
    expect(pauses[1].timeS).toBeGreaterThan(layers[0].startsAtS);
    expect(pauses[2].timeS).toBe(pauses[1].timeS);
    expect(pauses[3].timeS).toBeCloseTo(layers[1].startsAtS + layers[1].timeS, 9);
  });
});

describe("the window and its travels", () => {
  const shifted = heights(6).flatMap((z, k) => [...marker(k), ...ring(z, { x: 50 + k })]);
  const reading = read(["G0 X1 Y1", "G0 X2 Y2"], shifted, ["G0 X9 Y9"]);
  const { window, travels, layers } = reading;

  test("reaches from the first layer's write position to the line after the last laying move", () => {
    expect(window.start).toEqual(layers[0].writeAt);
    expect(window.end.line).toBe(layers[5].lastLine + 1);
    expect(window.end.offset).toBe(layers[5].endByte);
    expect(window.end.timeS).toBeCloseTo(layers[5].startsAtS + layers[5].timeS, 9);
  });

  test("travels rise in byte, line and time, and lie inside it", () => {
    expect(travels.count).toBe(5);
    for (const list of [travels.offset, travels.line, travels.timeS]) {
      expect(list).toHaveLength(travels.count);
      expect([...list]).toEqual([...list].sort((a, b) => a - b));
    }
    expect(travels.offset[0]).toBeGreaterThanOrEqual(window.start.offset);
    expect(travels.offset[travels.count - 1]).toBeLessThan(window.end.offset);
    expect(travels.timeS[0]).toBeGreaterThanOrEqual(window.start.timeS);
    expect(travels.timeS[travels.count - 1]).toBeLessThanOrEqual(window.end.timeS);
  });

  test("travels are kept densely near a layer's borders and sparsely far from them", () => {
    const hop = Array.from({ length: 1500 }, (_, k) => [`G1 X${k % 2 ? 50 : 62} E0.4`, `G0 Y${50 + (k % 40)}`]).flat();
    const long = read([";LAYER:0"], ring(0.2), hop, ["G0 X10"], ring(0.4), hop);
    const [layer] = long.layers;
    const times = [...long.travels.timeS].filter((timeS) => timeS < layer.startsAtS + layer.timeS);
    const gaps = times.slice(1).map((timeS, k) => ({ gap: timeS - times[k], at: timeS - layer.startsAtS }));
    const near = gaps.filter(({ at }) => at < 5 || at > layer.timeS - 5).map(({ gap }) => gap);
    const far = gaps.filter(({ at }) => Math.abs(at - layer.timeS / 2) < layer.timeS / 8).map(({ gap }) => gap);
    expect(layer.timeS).toBeGreaterThan(600);
    expect(Math.max(...near)).toBeLessThan(1.5);
    expect(Math.min(...far)).toBeGreaterThan(8);
    expect(Math.max(...far)).toBeLessThan(0.06 * layer.timeS);
  });

  test("a travel stands before the move that leaves what was laid, not before the ones behind it", () => {
    const hops = read([";LAYER:0"], ring(0.2), ["G1 E-1 F600", "G0 X5", "G0 X80 Y50", "G1 E1", "G1 X90 E1"], ring(0.4));
    const at = START.length + 8;
    expect([...hops.travels.line]).toEqual([at, at + 4]);
  });
});

describe("outputs that the machine has no channel for", () => {
  test("are named with their number and first line, where they stand between first and last layer", () => {
    const lines = [
      ...START,
      "M106 P5 S10",
      ";LAYER:0",
      ...ring(0.2),
      "M106 P5 S20",
      "M42 P9 S255",
      "SET_PIN PIN=light VALUE=1",
      ";LAYER:1",
      "M106 P5 S30",
      ...ring(0.4),
      "M106 P6 S255",
    ];
    const reading = readText(lines);
    const line = lines.indexOf("M106 P5 S20") + 1;
    expect(reading.outputs.foreign).toEqual([
      { command: "M106 P5", count: 2, line },
      { command: "M42 P9", count: 1, line: line + 1 },
      { command: "SET_PIN PIN=LIGHT", count: 1, line: line + 2 },
    ]);
    expect(reading.findings.find(({ code }) => code === "no-channel")).toMatchObject({ severity: "warning", line });
  });

  test("a file that lights the heater by itself is warned of, with its highest duty", () => {
    const reading = readText([...START, ";LAYER:0", ...ring(0.2), "M106 P2 S178", ";LAYER:1", ...ring(0.4)]);
    const finding = reading.findings.find(({ code }) => code === "controls-inside")!;
    expect(finding.severity).toBe("warning");
    expect(finding.message).toContain("0.70 at most");
  });
});
