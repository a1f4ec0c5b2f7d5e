import { describe, expect, test } from "vitest";
import type { Reading } from "#shared/layers/reading.ts";
import { END, heights, ring, rings, START, sides } from "#tests/helpers/part.ts";
import { findingsOf, readText } from "#tests/helpers/reading.ts";

const read = (...parts: string[][]): Reading => readText([...START, ...parts.flat(), ...END]);
const zs = ({ layers }: Reading): number[] => layers.map(({ zMm }) => zMm);
const thick = ({ layers }: Reading): number[] => layers.map(({ heightMm }) => heightMm);

describe("a layer begins at the first laying move at a new height", () => {
  const reading = read(rings(heights(3)));

  test("not at the move that goes there: the travel to the next layer counts for the one below", () => {
    expect(reading.layers.map(({ firstLine, lastLine }) => [firstLine, lastLine])).toEqual([
      [START.length + 2, START.length + 6],
      [START.length + 7, START.length + 11],
      [START.length + 12, START.length + 15],
    ]);
    const withoutTravels = read(ring(0.2), ["G0 Z0.4"], sides(), ["G0 Z0.6"], sides());
    expect(reading.layers[0].travelLengthMm).toBeCloseTo(0.2, 9);
    expect(withoutTravels.layers[0].timeS).toBeCloseTo(reading.layers[0].timeS, 9);
  });

  test("and lasts until the next begins; the last one ends with the last laying move", () => {
    const [one, two, three] = reading.layers;
    expect(one.startsAtS + one.timeS).toBeCloseTo(two.startsAtS, 9);
    expect(two.startsAtS + two.timeS).toBeCloseTo(three.startsAtS, 9);
    expect(three.startsAtS + three.timeS).toBeCloseTo(reading.window.end.timeS, 9);
    expect(one.endByte).toBe(two.firstByte);
    expect(three.endByte).toBe(reading.window.end.offset);
  });

  test("the times before the first and after the last complete the file", () => {
    const short = read(rings(heights(3)), ["G0 X0 Y0"]);
    const long = read(rings(heights(3)), ["G0 X0 Y0", "G1 E-5 F600", "G0 Z60"]);
    expect(short.beforeFirstLayerS).toBe(short.layers[0].startsAtS);
    expect(short.beforeFirstLayerS).toBeGreaterThan(0.5);
    expect(long.totals.printTimeS).toBeCloseTo(short.totals.printTimeS, 9);
    expect(long.afterLastLayerS).toBeGreaterThan(short.afterLastLayerS + 3);
  });
});

describe("no layer of its own is made by", () => {
  test("a hop over the part, however high", () => {
    const hop = (z: number): string[] => [...ring(z), `G0 Z${z + 1}`, "G0 X80 Y50", `G0 Z${z}`, ...sides({ x: 80 })];
    expect(zs(read(heights(3).flatMap(hop)))).toEqual([0.2, 0.4, 0.6]);
  });

  test("material pulled back along a wipe, or pushed out on the spot, at another height", () => {
    const reading = read(ring(0.2), ["G1 X60 E-0.5", "G0 Z1", "G1 E3 F600", "G1 X50 Y50 E-.2", "G0 Z0.4"], sides());
    expect(zs(reading)).toEqual([0.2, 0.4]);
  });

  test("a travel, or a move in Z that feeds material", () => {
    expect(zs(read(ring(0.2), ["G1 Z5 E1 F600", "G0 X10 Y10 Z3"], ring(0.4)))).toEqual([0.2, 0.4]);
  });

  test("a difference of less than half a micrometre", () => {
    expect(zs(read(rings([0.2, 0.2000004, 0.4])))).toEqual([0.2, 0.4]);
    expect(zs(read(rings([0.2, 0.201])))).toEqual([0.2, 0.201]);
    expect(zs(read(["G91", "G0 X50 Y50 Z.2 F6000"], sides({ x: 0, y: 0 }), ["G90"], rings([0.1 + 0.1])))).toEqual([
      0.2,
    ]);
  });
});

test("heights may vary from layer to layer", () => {
  const reading = read(rings([0.3, 0.4, 0.6, 0.65]));
  expect(zs(reading)).toEqual([0.3, 0.4, 0.6, 0.65]);
  expect(thick(reading)).toEqual([0.3, 0.1, 0.2, 0.05]);
});

describe("where material is laid while Z rises", () => {
  /** Turns of a square that climbs by a quarter of the height at each side. */
  const climbing = (turns: number, before: (turn: number) => string[] = () => []): string[] => {
    const z = (steps: number): string => (0.2 + 0.05 * steps).toFixed(3);
    const corners = ["X70 Y50", "X70 Y70", "X50 Y70", "X50 Y50"];
    return Array.from({ length: turns }, (_, turn) => [
      ...before(turn),
      ...corners.map((corner, side) => `G1 ${corner} Z${z(4 * turn + side + 1)} E0.8 F1800`),
    ]).flat();
  };

  test("a spiral is cut into layers of the nominal height, and told", () => {
    const reading = read(ring(0.2), climbing(5));
    expect(zs(reading)).toEqual([0.2, 0.4, 0.6, 0.8, 1, 1.2]);
    for (const height of thick(reading)) expect(height).toBeCloseTo(0.2, 9);
    expect(findingsOf(reading)).toEqual(["spiral"]);
    expect(reading.layers.every(({ filamentMm }) => Math.abs(filamentMm - 3.2) < 1e-9)).toBe(true);
  });

  test("a spiral from the first move on is a layer more, at most", () => {
    const reading = read(["G0 X50 Y50 Z0.2 F6000"], climbing(5));
    expect(reading.layers.length).toBeGreaterThanOrEqual(5);
    expect(reading.layers.length).toBeLessThanOrEqual(6);
    expect(findingsOf(reading)).toEqual(["spiral"]);
  });

  test("a spiral with a marker for each turn has its layers at the markers", () => {
    const reading = read(
      [";LAYER:0"],
      ring(0.2),
      climbing(5, (turn) => [`;LAYER:${turn + 1}`]),
    );
    expect(reading.layers.map(({ marker }) => marker)).toEqual([0, 1, 2, 3, 4, 5].map((k) => `LAYER:${k}`));
    expect(findingsOf(reading)).toEqual(["spiral"]);
  });

  test("a spiral that starts on the bed is not cut thinner than anyone prints", () => {
    const reading = read(["G0 X50 Y50 Z0 F6000", "G1 X70 Z0.02 E0.8 F1800"], ["G1 Y70 Z0.04 E.8", "G1 X50 Z0.06 E.8"]);
    expect(zs(reading)).toEqual([0.04, 0.06]);
  });

  test("a line that climbs by many heights at once is one layer: commands can't stand inside it", () => {
    const reading = read(ring(0.2), ["G3 I10 Z3.2 E5", "G3 I10 Z3.4 E5", "G18", "G3 X70 I10 E5"], ring(4));
    expect(reading.layers.map(({ firstLine, lastLine }) => lastLine >= firstLine)).not.toContain(false);
    expect(zs(reading).slice(0, 3)).toEqual([0.2, 3.2, 3.4]);
    expect(thick(reading).slice(0, 3)).toEqual([0.2, 3, 0.2]);
  });

  test("a stated layer height sets where it is cut", () => {
    const reading = read([";HEIGHT:0.4"], ["G0 X50 Y50 Z0.2 F6000"], climbing(8));
    expect(zs(reading)).toEqual([0.4, 0.8, 1.2, 1.6, 1.8]);
  });

  test("a seam that ramps up stays within its layer, from the height below as from in between", () => {
    for (const start of [0.2, 0.15, 0.05]) {
      const ramped = (z: number): string[] => [
        `G0 X48 Y50 Z${(z - start).toFixed(2)} F6000`,
        `G1 X55 Z${(z - start / 2).toFixed(3)} E0.2 F1800`,
        `G1 X60 Z${z} E0.2`,
        "G1 X70 E0.4",
        ...sides().slice(1),
      ];
      const reading = read(ring(0.2), [0.4, 0.6, 0.8].flatMap(ramped));
      expect(zs(reading)).toEqual([0.2, 0.4, 0.6, 0.8]);
      expect(thick(reading).every((height) => Math.abs(height - 0.2) < 1e-9)).toBe(true);
      expect(findingsOf(reading)).toEqual([]);
    }
  });
});

describe("where Z falls a new object begins", () => {
  const twice = read(
    rings(heights(3)),
    heights(2).flatMap((z) => ring(z, { x: 100 })),
  );

  test("layers count on, objects count up, heights start again at the bed", () => {
    expect(twice.layers.map(({ index, object, zMm, heightMm }) => [index, object, zMm, heightMm])).toEqual([
      [1, 1, 0.2, 0.2],
      [2, 1, 0.4, 0.2],
      [3, 1, 0.6, 0.2],
      [4, 2, 0.2, 0.2],
      [5, 2, 0.4, 0.2],
    ]);
    expect(findingsOf(twice)).toEqual(["sequential"]);
  });

  test("an object may have another first layer", () => {
    const reading = read(
      rings([0.2, 0.4]),
      [0.3, 0.5].flatMap((z) => ring(z, { x: 100 })),
    );
    expect(reading.layers[2]).toMatchObject({ object: 2, zMm: 0.3, heightMm: 0.3 });
    expect(reading.layers[3]).toMatchObject({ object: 2, zMm: 0.5, heightMm: 0.2 });
  });
});

test("a part of one layer is a part", () => {
  expect(read(ring(0.2)).layers).toHaveLength(1);
});
