import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { type Recorder, run } from "#tests/helpers/recorder.ts";
import { tern } from "#tests/helpers/tern.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

const pathMm = ({ moves }: Recorder): number =>
  moves.reduce((sum, { from, to }) => sum + Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]), 0);

const fedMm = ({ fed }: Recorder): number => fed.reduce((sum, part) => sum + part, 0);

describe("an arc", () => {
  test("is cut into whole chords of about the machine's arc segment, at least one", () => {
    const chords = (lines: string[], arcSegmentMm = 1) => run(lines, tern({ motion: { arcSegmentMm } })).moves.length;
    expect(chords(["G3 X0 Y0 I-10"])).toBe(62);
    expect(chords(["G2 X0 Y0 I-10"])).toBe(62);
    expect(chords(["G2 X0 Y0 I-10"], 0.5)).toBe(125);
    expect(chords(["G2 X0.1 Y0.1 I.1"])).toBe(1);
    expect(chords(["G2 X20 I10"], 50)).toBe(1);
  });

  test("never becomes more chords than memory bears", () => {
    expect(run(["G2 I1000000"], tern({ motion: { arcSegmentMm: 0.01 } })).moves).toHaveLength(100_000);
  });

  test("ends exactly where its words say, every chord touching the circle", () => {
    const coordinate = fc.double({ min: -50, max: 50, noNaN: true }).map((v) => v.toFixed(3));
    fc.assert(
      fc.property(coordinate, coordinate, coordinate, fc.constantFrom("G2", "G3"), (x, y, z, g) => {
        fc.pre(Math.hypot(Number(x), Number(y)) > 0.1);
        const recorder = run(["G1 Z0.3", `${g} X${x} Y${y} Z${z} R60 E3`]);
        expect(recorder.position).toEqual([x, y, z].map((word) => Number(word) + 0));
        const [centreX, centreY] = centreOf(recorder);
        for (const { to } of recorder.moves.slice(1))
          expect(Math.hypot(to[0] - centreX, to[1] - centreY)).toBeCloseTo(60, 4);
        expect(fedMm(recorder)).toBeCloseTo(3, 9);
      }),
      { examples: [["5", "5", "-32", "G2"]] },
    );
  });

  test("has material, rise and length shared evenly", () => {
    const { moves } = run(["G3 X-10 Y0 I-5 J0 Z3.1 E1.6"]);
    expect(moves).toHaveLength(16);
    for (const [k, { fed, to }] of moves.entries()) {
      expect(fed).toBeCloseTo(0.1, 12);
      expect(to[2]).toBeCloseTo(((k + 1) * 3.1) / 16, 12);
    }
  });

  test.each([
    ["G5", ["G1 X7 Y7 F600", "G2 X10 Y16 I3 J4"], 12.490458],
    ["G5 rising", ["G1 X7 Y7 Z5 F600", "G17 G2 X10 Y16 I3 J4 Z9"], 13.115317],
    ["G6", ["G1 X9 Y6 F600", "G3 X2 Y7 I-4 J-3"], 7.853982],
    ["G6 by radius", ["G1 X9 Y6 F600", "G3 X2 Y7 R5"], 7.853982],
    ["G7", ["G1 X0.0001 F600", "G2 X1 Y1 I1"], 1.570796],
    ["G8", ["G1 X0.0001 F600", "G2 X0 Y1 I1 J.5"], 1.036748],
    ["G9", ["G1 X0.0001 F600", "G2 I20 J20"], 177.715318],
    ["G10", ["G1 X0.0001 F600", "G2 X10 Y15 R20"], 18.701701],
    ["G10 the long way", ["G1 X0.0001 F600", "G2 X10 Y15 R-20"], 106.962005],
  ])("%s has the length of the reference sheet, when cut finely", (_, lines, length) => {
    const recorder = run(lines, tern({ motion: { arcSegmentMm: 0.01 } }));
    recorder.moves.shift();
    expect(Math.abs(pathMm(recorder) - length)).toBeLessThan(2e-4);
  });

  test("G11: with start and end on different circles is told and taken as a straight line", () => {
    const recorder = run(["G17 G2 X10 Y16 I3 J4 Z-1 E1 F600"]);
    expect(recorder.oddities).toEqual(["several-commands", "arc-invalid"]);
    expect(recorder.moves).toEqual([{ from: [0, 0, 0], to: [10, 16, -1], fed: 1, speed: 10 }]);
  });

  test("without X and Y is a full circle that ends where it began", () => {
    const recorder = run(["G1 X30 Y40 F600", "G3 I-10 J0 E2"]);
    expect(recorder.position).toEqual([30, 40, 0]);
    expect(pathMm(recorder)).toBeCloseTo(50 + 2 * Math.PI * 10, 1);
    expect(fedMm(recorder)).toBeCloseTo(2, 9);
  });

  test("by radius back to its start has no centre, and moves nothing", () => {
    const recorder = run(["G1 X30 F600", "G2 X30 R5"]);
    expect(recorder.oddities).toEqual(["arc-invalid"]);
    expect(recorder.moves).toHaveLength(1);
  });

  test("lies in the plane in force: G17 XY with I J, G18 ZX with I K, G19 YZ with J K", () => {
    const xy = run(["G17", "G2 X1 Y1 I1"]);
    const zx = run(["G18", "G2 Z1 X1 K1"]);
    const yz = run(["G19", "G2 Y1 Z1 J1"]);
    const middle = tern({ motion: { arcSegmentMm: 0.7 } });
    expect([xy, zx, yz].map(({ position }) => position)).toEqual([
      [1, 1, 0],
      [1, 0, 1],
      [0, 1, 1],
    ]);
    const [a, b, c] = [
      ["G17", "G2 X1 Y1 I1"],
      ["G18", "G2 Z1 X1 K1"],
      ["G19", "G2 Y1 Z1 J1"],
    ].map((lines) => run(lines, middle).moves[0].to);
    expect(a[0]).toBeCloseTo(1 - Math.SQRT1_2, 12);
    expect(a[1]).toBeCloseTo(Math.SQRT1_2, 12);
    expect([b[2], b[0], b[1]]).toEqual(a);
    expect([c[1], c[2], c[0]]).toEqual(a);
  });

  test("counts from the machine's position in either mode, and its offsets are always relative", () => {
    const absolute = run(["G1 X10 Y10", "G3 X12 Y12 I0 J2"]).moves;
    expect(run(["G1 X10 Y10", "G91", "G3 X2 Y2 I0 J2"]).moves).toEqual(absolute);
    expect(run(["G1 X10 Y10", "G92 X0 Y0", "G3 X2 Y2 J2"]).moves).toEqual(absolute);
  });

  test("is measured in the unit in force", () => {
    const inches = run(["G20", "G3 X1 Y1 J1 E.1 F10"]);
    expect(inches.position).toEqual([25.4, 25.4, 0]);
    expect(pathMm(inches)).toBeCloseTo((Math.PI / 2) * 25.4, 1);
    expect(fedMm(inches)).toBeCloseTo(2.54, 9);
  });

  test("takes its own F, and feeds by the mode in force", () => {
    const recorder = run(["M83", "G2 X20 I10 E2 F1200", "G2 X0 I-10 E1"]);
    expect(recorder.last.speed).toBe(20);
    expect(fedMm(recorder)).toBeCloseTo(3, 9);
    expect(fedMm(run(["M82", "G2 X20 I10 E2", "G2 X0 I-10 E3"]))).toBeCloseTo(3, 9);
    expect(fedMm(run(["M221 S50", "M82", "G2 X20 I10 A2"]))).toBeCloseTo(1, 9);
  });
});

/** Centre of the circle of radius 60 through the origin and the end, on the side that the first chord bends from. */
function centreOf({ moves }: Recorder): [number, number] {
  const [, first, ...rest] = moves;
  const last = rest[rest.length - 1] ?? first;
  const [x, y] = last.to;
  const chord = Math.hypot(x, y);
  const height = Math.sqrt(60 * 60 - (chord * chord) / 4);
  const sides = [-1, 1].map((side): [number, number] => [
    x / 2 - (side * height * y) / chord,
    y / 2 + (side * height * x) / chord,
  ]);
  const miss = ([cx, cy]: [number, number]): number => Math.abs(Math.hypot(first.to[0] - cx, first.to[1] - cy) - 60);
  return miss(sides[0]) < miss(sides[1]) ? sides[0] : sides[1];
}
