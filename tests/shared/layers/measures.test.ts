import { describe, expect, test } from "vitest";
import type { Layer, Reading } from "#shared/layers/reading.ts";
import { END, heights, marker, ring, rings, START, sides } from "#tests/helpers/part.ts";
import { readText } from "#tests/helpers/reading.ts";
import { tern } from "#tests/helpers/tern.ts";

const read = (...parts: string[][]): Reading => readText([...START, ...parts.flat(), ...END]);
const first = (...parts: string[][]): Layer => read(...parts).layers[0];
const FILAMENT_MM2 = Math.PI * (1.75 / 2) ** 2;

describe("what is measured of a layer", () => {
  const layer = first(ring(0.2), ["G0 X80 Y50"], sides({ x: 80, size: 10, e: 0.4 }), ring(0.4));

  test("length laid and length travelled, the travel to the next layer included", () => {
    expect(layer.depositedLengthMm).toBeCloseTo(4 * 20 + 4 * 10, 9);
    expect(layer.travelLengthMm).toBeCloseTo(30 + Math.hypot(30, 0.2), 9);
  });

  test("filament, its volume, and the area it covers at the layer's height", () => {
    expect(layer.filamentMm).toBeCloseTo(4 * 0.8 + 4 * 0.4, 9);
    expect(layer.volumeMm3).toBeCloseTo(4.8 * FILAMENT_MM2, 9);
    expect(layer.areaMm2).toBeCloseTo((4.8 * FILAMENT_MM2) / 0.2, 9);
  });

  test("material pulled back or pushed out on the spot is not filament laid", () => {
    const wiped = first(ring(0.2), ["G1 X60 E-1", "G1 E1 F600", "G0 X80"], ring(0.4));
    expect(wiped.filamentMm).toBeCloseTo(3.2, 9);
    expect(wiped.depositedLengthMm).toBeCloseTo(80, 9);
    expect(wiped.travelLengthMm).toBeCloseTo(10 + 20 + Math.hypot(30, 0.2), 9);
  });

  test("the box around what is laid, travels left out", () => {
    expect(layer.boxMm).toEqual({ min: [50, 50], max: [90, 70] });
    expect(first(["G0 X0 Y0"], ring(0.2), ["G0 X200 Y200"], ring(0.4)).boxMm).toEqual({ min: [50, 50], max: [70, 70] });
  });

  test("time, and the share of it that lays material", () => {
    expect(layer.extrudingTimeS).toBeGreaterThan(120 / 30);
    expect(layer.extrudingTimeS).toBeLessThan(layer.timeS);
    expect(layer.timeS - layer.extrudingTimeS).toBeGreaterThan(60 / 100);
  });

  test("the file's own filament diameter counts for the volume, when it is stated and plausible", () => {
    const stated = (comment: string): number => readText([comment, ...START, ...ring(0.2)]).layers[0].volumeMm3;
    const [thin, thick] = [1.75, 2.85].map((mm) => 3.2 * Math.PI * (mm / 2) ** 2);
    expect(stated("; filament_diameter = 2.85")).toBeCloseTo(thick, 9);
    expect(stated("; Filament diameter = 2.85,2.85")).toBeCloseTo(thick, 9);
    for (const comment of ["; filament_diameter = 100", "; filament_diameter = ", "; filament diameter: 2.85"])
      expect(stated(comment)).toBeCloseTo(thin, 9);
    const machine = tern({ motion: { filamentDiameterMm: 2.85 } });
    expect(readText([...START, ...ring(0.2)], machine).layers[0].volumeMm3).toBeCloseTo(thick, 9);
  });
});

describe("the outline", () => {
  test("is what comments call the outer wall, when they do", () => {
    const layer = first(
      ["G0 X40 Y40 Z0.2 F6000", ";TYPE:WALL-INNER"],
      sides({ x: 40, y: 40, size: 40 }),
      ["G0 X50 Y50", ";TYPE:WALL-OUTER"],
      sides(),
      [";TYPE:FILL", "G1 X70 Y70 E1"],
    );
    expect(layer.outlineFrom).toBe("comments");
    expect(layer.outlineMm).toBeCloseTo(80, 9);
  });

  test("without comments is the longest closed run", () => {
    const layer = first(ring(0.2), ["G0 X80 Y50"], sides({ x: 80, size: 10 }), ["G0 X90 Y90", "G1 X200 E4", "G0 X0"]);
    expect(layer.outlineFrom).toBe("geometry");
    expect(layer.outlineMm).toBeCloseTo(80, 9);
  });

  test("a loop may end short of where it began", () => {
    const open = (gap: number): string[] => [
      "G0 X50 Y50 Z0.2",
      "G1 X70 E1",
      "G1 Y70 E1",
      "G1 X50 E1",
      `G1 Y${50 + gap} E1`,
    ];
    expect(first(open(0.5)).outlineMm).toBeCloseTo(79.5, 9);
    expect(first(open(0.7)).outlineMm).toBeCloseTo(80, 9);
    expect(first(open(5)).outlineMm).toBeCloseTo(80, 9);
  });

  test("without any loop is the box around the layer", () => {
    expect(first(["G0 X50 Y50 Z0.2", "G1 X70 Y60 E1"]).outlineMm).toBeCloseTo(60, 9);
  });

  test("found by comments in one layer says nothing of the next", () => {
    const { layers } = read([";TYPE:WALL-OUTER"], ring(0.2), [";TYPE:FILL"], ring(0.4));
    expect(layers.map(({ outlineFrom }) => outlineFrom)).toEqual(["comments", "geometry"]);
    expect(layers[1].outlineMm).toBeCloseTo(80, 9);
  });
});

describe("set-points", () => {
  test("are those in force when the layer begins; none is null", () => {
    const { layers } = readText([
      "G90",
      "M83",
      ";LAYER:0",
      ...ring(0.2),
      "M104 S380",
      ...ring(0.4),
      "M140 S110",
      "M109 R385",
      ...ring(0.6),
      "M104 S0",
    ]);
    expect(layers.map(({ nozzleC, bedC }) => [nozzleC, bedC])).toEqual([
      [null, null],
      [380, null],
      [385, 110],
    ]);
  });

  test.each([
    ["START_PRINT EXTRUDER_TEMP=385 BED_TEMP=125", 385, 125],
    ["start_print extruder=385 bed=125", 385, 125],
    ["PRINT_START HOTEND=385.5 BED='125' MATERIAL=PEEK", 385.5, 125],
    ["BEGIN TOOL_TEMPERATURE=385", 385, null],
    ["SET_HEATER_TEMPERATURE HEATER=extruder TARGET=385", 385, null],
    ["SET_HEATER_TEMPERATURE HEATER=heater_bed TARGET=125", null, 125],
    ["SET_HEATER_TEMPERATURE HEATER=chamber TARGET=90", null, null],
    ["START_PRINT EXTRUDER_TEMP={temperature} BED_TEMP=", null, null],
    ["CLEAN NOZZLES=3", null, null],
  ])("are heard in a macro's arguments: %s", (line, nozzleC, bedC) => {
    expect(readText(["G90", "M83", line, ...ring(0.2)]).layers[0]).toMatchObject({ nozzleC, bedC });
  });
});

test("totals are the sums of the layers", () => {
  const { totals, layers } = read(rings(heights(7), marker));
  const sum = (of: (layer: Layer) => number): number => layers.reduce((total, layer) => total + of(layer), 0);
  expect(totals).toEqual({
    printTimeS: sum(({ timeS }) => timeS),
    layers: 7,
    depositedLengthMm: sum(({ depositedLengthMm }) => depositedLengthMm),
    travelLengthMm: sum(({ travelLengthMm }) => travelLengthMm),
    filamentMm: sum(({ filamentMm }) => filamentMm),
  });
  expect(totals.filamentMm).toBeCloseTo(7 * 3.2, 9);
});

describe("waits", () => {
  test("are listed in the layer they stand in, with their line; what they last is known for dwells only", () => {
    const lines = [
      ...START,
      ...ring(0.2),
      "G4 P1500",
      "M109 S380",
      "T1",
      "M600",
      "G28 X",
      "M400",
      "G4 P0",
      "M0 Click to go on",
      ...ring(0.4),
    ];
    const { layers } = readText([";LAYER:0", ...lines]);
    const at = (text: string): number => lines.indexOf(text) + 2;
    expect(layers[0].waits).toEqual([
      { kind: "dwell", line: at("G4 P1500"), seconds: 1.5 },
      { kind: "temperature", line: at("M109 S380"), seconds: null },
      { kind: "tool", line: at("T1"), seconds: null },
      { kind: "pause", line: at("M600"), seconds: null },
      { kind: "home", line: at("G28 X"), seconds: null },
      { kind: "pause", line: at("M0 Click to go on"), seconds: null },
    ]);
    expect(layers[1].waits).toEqual([]);
  });

  test("a dwell is time of its layer, the other waits are not print time but stop the nozzle", () => {
    const timeOf = (...between: string[]): number =>
      first([";LAYER:0", "G0 X50 Y50 Z0.2 F6000", "G1 X70 E1 F1800"], between, ["G1 X90 E1"], ring(0.4)).timeS;
    const through = timeOf();
    const stopped = timeOf("M400");
    expect(stopped).toBeGreaterThan(through + 0.01);
    for (const wait of ["M109 S390", "T1", "M600", "PAUSE", "M116"]) expect(timeOf(wait)).toBeCloseTo(stopped, 9);
    expect(timeOf("G4 P2500")).toBeCloseTo(stopped + 2.5, 9);
    expect(timeOf("G4 S2")).toBeCloseTo(stopped + 2, 9);
    for (const line of [
      "M106 S128",
      "M104 S300",
      "G92 E0",
      "M117 text",
      ";LAYER:9",
      "M73 P5",
      "SET_PIN PIN=a VALUE=1",
      "/skip",
    ])
      expect(timeOf(line)).toBeCloseTo(through, 12);
  });

  test("the file's own acceleration counts where the machine obeys it, and never above the machine's", () => {
    const timeOf = (line: string, honourFileLimits: boolean): number =>
      readText([...START, line, ...ring(0.2)], tern({ motion: { honourFileLimits } })).totals.printTimeS;
    const plain = timeOf("", false);
    for (const line of ["M204 S100", "M204 P100", "M201 X100 Y100", "SET_VELOCITY_LIMIT ACCEL=100"]) {
      expect(timeOf(line, false)).toBe(plain);
      expect(timeOf(line, true)).toBeGreaterThan(plain + 0.1);
    }
    for (const line of [
      "M204 S9000",
      "M201 X9000 Y9000 E9000",
      "M203 X900",
      "M205 X90",
      "SET_VELOCITY_LIMIT ACCEL=9000",
    ])
      expect(timeOf(line, true)).toBeCloseTo(plain, 9);
    expect(timeOf("M203 X10 Y10", true)).toBeGreaterThan(8);
  });

  test("dwells before the first layer are time before it", () => {
    const before = read(["G4 S7"], ring(0.2)).beforeFirstLayerS;
    expect(before).toBeCloseTo(read(ring(0.2)).beforeFirstLayerS + 7, 9);
  });
});
