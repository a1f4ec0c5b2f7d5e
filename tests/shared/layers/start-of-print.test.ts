import { describe, expect, test } from "vitest";
import type { Reading } from "#shared/layers/reading.ts";
import { END, heights, marker, primeLine, ring, rings, START, sides } from "#tests/helpers/part.ts";
import { findingsOf, readText } from "#tests/helpers/reading.ts";

const read = (...parts: string[][]): Reading => readText([...START, ...parts.flat(), ...END]);

/** What matters of layers: the same with whatever came before them. */
const shape = ({ layers }: Reading) =>
  layers.map(({ index, object, zMm, heightMm, filamentMm, areaMm2, depositedLengthMm }) => ({
    index,
    object,
    zMm,
    heightMm,
    filamentMm,
    areaMm2,
    depositedLengthMm: depositedLengthMm.toFixed(6),
  }));

const plain = read(rings(heights(3)));

describe("a prime line is the start of the print, not a layer", () => {
  const cases: [where: string, z: number][] = [
    ["above layer 1", 0.5],
    ["below it", 0.1],
    ["20 µm above it", 0.22],
    ["20 µm below it", 0.18],
  ];

  test.each(cases)("%s, where markers name the layers", (_, z) => {
    const reading = read(primeLine(z), rings(heights(3), marker));
    expect(shape(reading)).toEqual(shape(plain));
    expect(findingsOf(reading)).toEqual([]);
    expect(reading.beforeFirstLayerS).toBeGreaterThan(plain.beforeFirstLayerS);
  });

  test.each(cases)("%s, where nothing names the layers", (_, z) => {
    const reading = read(primeLine(z), rings(heights(3)));
    expect(shape(reading)).toEqual(shape(plain));
    expect(findingsOf(reading)).toEqual([`prime-line ${START.length + 2}`]);
    expect(reading.findings[0].message).toContain(`${z} mm`);
  });

  test("at the height of layer 1, where markers name the layers", () => {
    expect(shape(read(primeLine(0.2), rings(heights(3), marker)))).toEqual(shape(plain));
  });

  test("at the height of layer 1, where nothing names the layers, it can't be told and belongs to layer 1", () => {
    const reading = read(primeLine(0.2), rings(heights(3)));
    expect(reading.layers).toHaveLength(3);
    expect(reading.layers[0].filamentMm).toBeCloseTo(2 + 4 * 0.8, 9);
  });

  test("before a homing or a wait for temperature, where nothing names the layers", () => {
    for (const wait of ["G28", "M109 S390", "M190 S120", "TEMPERATURE_WAIT SENSOR=extruder"]) {
      const reading = read(primeLine(0.2), [wait], rings(heights(3)));
      expect(shape(reading)).toEqual(shape(plain));
      expect(findingsOf(reading).filter((code) => !code.startsWith("macro"))).toEqual([]);
    }
  });

  test("while a homing or a wait behind the last layer of a flat part leaves the part alone", () => {
    for (const end of ["G28 X0", "M109 R60"])
      for (const count of [1, 2]) {
        const part = rings(heights(count));
        const [reading, same] = [read(part, ["G0 X0 Y0", end]), read(part, ["G0 X0 Y0"])];
        expect(shape(reading)).toEqual(shape(same));
        expect(reading.totals.printTimeS).toBeCloseTo(same.totals.printTimeS, 9);
        expect(reading.window.end).toEqual(same.window.end);
      }
  });

  test("two of them at two heights are none either", () => {
    const two = [...primeLine(0.3), "G0 X5 Y8 Z0.25", "G1 X40 E2"];
    expect(shape(read(two, rings(heights(3))))).toEqual(shape(plain));
    expect(shape(read(two, rings(heights(3), marker)))).toEqual(shape(plain));
  });

  test("in one piece with the part it is a layer", () => {
    const over = ["G0 X50 Y50 Z0.1 F6000", "G1 X70 E1 F1200"];
    expect(read(over, rings(heights(3))).layers.map(({ zMm }) => zMm)).toEqual([0.1, 0.2, 0.4, 0.6]);
  });

  test("a blob on the spot, or material wiped off while moving back, is nothing at all", () => {
    expect(shape(read(["G0 X5 Y5 Z5", "G1 E20 F300", "G1 X40 E-1"], rings(heights(3))))).toEqual(shape(plain));
  });
});

test("a skirt at the height of layer 1 belongs to layer 1, behind the marker as without one", () => {
  const skirt = ring(0.2, { x: 40, y: 40, size: 40, e: 1 });
  for (const reading of [
    read(
      [";LAYER:0"],
      skirt,
      sides(),
      rings([0.4, 0.6], (k) => marker(k + 1)),
    ),
    read(skirt, rings(heights(3))),
  ]) {
    expect(reading.layers).toHaveLength(3);
    expect(reading.layers[0].filamentMm).toBeGreaterThan(7);
    expect(reading.layers[0].boxMm).toEqual({ min: [40, 40], max: [80, 80] });
  }
});

describe("commands of the first layer are written", () => {
  test("before its first laying move where no marker stands", () => {
    const { window, layers } = plain;
    expect(window.start.line).toBe(START.length + 2);
    expect(window.start).toEqual(layers[0].writeAt);
    expect(window.start.offset).toBe(layers[0].firstByte);
    expect(window.start.timeS).toBe(layers[0].startsAtS);
  });

  test("before its marker where one stands between, with the time of that place", () => {
    const { window, layers } = read(primeLine(0.5), rings(heights(3), marker));
    expect(window.start.line).toBe(START.length + 3);
    expect(window.start.timeS).toBeLessThan(layers[0].startsAtS);
    expect(layers[1].writeAt.line).toBe(layers[1].firstLine - 2);
    expect(layers[1].writeAt.timeS).toBeLessThan(layers[1].startsAtS);
    expect(layers.map((layer) => layer.marker)).toEqual(["LAYER:0", "LAYER:1", "LAYER:2"]);
  });

  test("before the first of several markers between two layers", () => {
    const { layers } = read([";LAYER:0"], ring(0.2), [";LAYER:1", "G0 X1 Y1", ";LAYER:1"], ring(0.4));
    expect(layers[1].writeAt.line).toBe(START.length + 7);
  });
});

test("a file without a layer at all is refused, whatever it moves", () => {
  for (const lines of [["G1 X10 F600"], ["G1 E5 F600", "G1 X5 E-1"], ["G28"], ["; only a comment"]])
    expect(() => readText(lines)).toThrow(/lines moves in X or Y while feeding material forward/);
});

test("an empty file is refused as such", () => {
  expect(() => readText("")).toThrow("the file is empty");
});
