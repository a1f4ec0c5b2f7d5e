import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import { run } from "#tests/helpers/recorder.ts";
import { tern } from "#tests/helpers/tern.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

describe("positions", () => {
  test("are absolute after G90 and relative after G91, in X, Y and Z", () => {
    expect(run(["G1 X5 Y6 Z7", "G91", "G1 X1 Y-2 Z.5", "G90", "G1 X1"]).moves.map(({ to }) => to)).toEqual([
      [5, 6, 7],
      [6, 4, 7.5],
      [1, 4, 7.5],
    ]);
  });

  test("each move starts where the one before it ended", () => {
    const { moves } = run(["G1 X5", "G1 Y6 E1", "G2 X0 Y6 I-2.5", "G91", "G1 Z2"]);
    for (const [k, move] of moves.entries()) if (k > 0) expect(move.from).toEqual(moves[k - 1].to);
  });

  test("count in inches after G20 and in millimetres after G21, speeds and material too", () => {
    const { moves } = run(["G20", "G1 X1 E.1 F60", "G21", "G1 X50.8 E3.54", "G20", "G91", "G1 X1"]);
    expect(moves.map(({ to }) => to[0])).toEqual([25.4, 50.8, 50.8 + 25.4]);
    expect(moves[0]).toMatchObject({ fed: 2.54, speed: 25.4 });
    expect(moves[1].fed).toBeCloseTo(1, 12);
  });

  test("a line of axis words alone repeats the motion word before it", () => {
    const { moves } = run(["G1 X5 F600", "X6 Y7", "G3 X8 Y7 I1", "Y9 X8 J1 I0"]);
    expect(moves[1].to).toEqual([6, 7, 0]);
    expect(moves[moves.length - 1].to).toEqual([8, 9, 0]);
    expect(moves.length).toBeGreaterThan(6);
    expect(run(["F600", "G1 X1"]).last.speed).toBe(10);
  });

  test("homing puts the named axes to zero, all of them when none is named", () => {
    expect(run(["G1 X5 Y6 Z7", "G28 X"]).position).toEqual([0, 6, 7]);
    expect(run(["G1 X5 Y6 Z7", "G28 Y0 Z0"]).position).toEqual([5, 0, 0]);
    expect(run(["G1 X5 Y6 Z7", "G28"]).position).toEqual([0, 0, 0]);
    expect(run(["G92 X-10", "G28 X", "G1 X5"]).position[0]).toBe(5);
  });

  test("words of probing and offsets are tolerated", () => {
    const { moves, waits, oddities } = run(["G53", "G54", "G59", "G29", "G94", "G1 X1"]);
    expect(moves).toHaveLength(1);
    expect(waits).toEqual([["home", null]]);
    expect(oddities).toEqual([]);
  });

  test("lines that move nothing are no moves", () => {
    expect(run(["G1", "G1 F600", "G1 X0 Y0", "G1 E0", "G0 Z0"]).moves).toEqual([]);
  });
});

describe("G92 sets where the program thinks it is", () => {
  test("the machine stays, later words count from there", () => {
    expect(run(["G1 X10", "G92 X0", "G1 X5"]).position[0]).toBe(15);
    expect(run(["G1 X10", "G92 X4", "G1 X5"]).position[0]).toBe(11);
    expect(run(["G20", "G1 X1", "G92 X0", "G1 X1"]).position[0]).toBe(50.8);
  });

  test("with no word, every axis and the extruder are at zero", () => {
    const { position, fed } = run(["G1 X1 Y2 Z3 E4", "G92", "G1 X1 Y1 Z1 E1"]);
    expect(position).toEqual([2, 3, 4]);
    expect(fed).toEqual([4, 1]);
  });

  test("E alone leaves the axes, and the other way round", () => {
    const { position, fed } = run(["G1 X1 Y2 Z3 E4", "G92 E0", "G1 X2 E1", "G92 X0", "G1 X1 E2"]);
    expect(position).toEqual([3, 2, 3]);
    expect(fed).toEqual([4, 1, 1]);
  });

  test("a letter without a number is zero, and touches no other axis", () => {
    const { position, fed } = run(["G1 X1 Z3 E4", "G92 E", "G1 X2 Z3.2 E1"]);
    expect(position).toEqual([2, 0, 3.2]);
    expect(fed).toEqual([4, 1]);
  });

  test("beside another command on the line it does what it says and no more", () => {
    const { position, fed } = run(["G1 X1 Z3 E4", "G90 G92 E0", "G1 X2 Z3.2 E1"]);
    expect(position).toEqual([2, 0, 3.2]);
    expect(fed).toEqual([4, 1]);
  });

  test("an extruder on axis A is set like one on E", () => {
    const { position, fed } = run(["G1 X1 Z3 A4", "G92 A0", "G1 X2 Z3.2 A1", "G92 B0", "G1 X3 A2"]);
    expect(position).toEqual([3, 0, 3.2]);
    expect(fed).toEqual([4, 1, 1]);
  });
});

describe("the extruder", () => {
  test("feeds the difference after M82 and the word itself after M83", () => {
    expect(run(["M82", "G1 X1 E1", "G1 X2 E1.5", "M83", "G1 X3 E.5", "M82", "G1 X4 E3"]).fed).toEqual([1, 0.5, 0.5, 1]);
  });

  test("is relative too while G91 holds, and falls back to its own mode", () => {
    expect(run(["M82", "G1 X1 E5", "G91", "G1 X1 E.5", "G90", "G1 X9 E6"]).fed).toEqual([5, 0.5, 0.5]);
    expect(run(["M83", "G91", "G90", "G1 X1 E1", "G1 X2 E1"]).fed).toEqual([1, 1]);
    expect(run(["G91", "M82", "G1 X1 E1", "G1 X1 E1"]).fed).toEqual([1, 1]);
  });

  test("takes the mode of the axes where the firmware family has it so: M83 … G91 … G90 leaves it absolute", () => {
    const family = tern({ motion: { axisModeSetsExtruder: true } });
    expect(run(["M83", "G91", "G90", "G1 X1 E1", "G1 X2 E1.5"], family).fed).toEqual([1, 0.5]);
    expect(run(["M82", "G91", "G1 X1 E1", "G1 X1 E1"], family).fed).toEqual([1, 1]);
    expect(run(["G91", "M82", "G1 X1 E1", "G1 X1 E1.5"], family).fed).toEqual([1, 0.5]);
    expect(run(["G90", "M83", "G1 X1 E1", "G1 X2 E1"], family).fed).toEqual([1, 1]);
  });

  test("may sit on axis A, and material may be laid by G0", () => {
    expect(run(["G1 X1 A1", "G0 X2 A3"]).fed).toEqual([1, 2]);
    expect(run(["G0 X1 E1"]).last).toMatchObject({ to: [1, 0, 0], fed: 1 });
  });

  test("is scaled by M221, whatever its mode", () => {
    expect(
      run(["M221 S50", "G1 X1 E1", "M83", "G1 X2 E1", "M221 S200", "G1 X3 E1", "M221 S0", "G1 X4 E1"]).fed,
    ).toEqual([0.5, 0.5, 2, 2]);
    expect(run(["G1 X1 E1", "M221 S50", "G1 X2 E2", "M221 S100", "G1 X3 E3"]).fed).toEqual([1, 0.5, 1]);
  });

  test("has no exponent: G1E10F50 feeds 10", () => {
    expect(run(["G1E10F50"]).last).toMatchObject({ fed: 10, speed: 50 / 60 });
  });

  test("retracts in the firmware by the machine's own length and speed, once each way", () => {
    const { moves } = run(["G1 X1 F600", "G10", "G10", "G1 X2", "G11", "G11", "G1 X3"]);
    expect(moves.map(({ fed }) => fed)).toEqual([0, -1, 0, 1, 0]);
    expect(moves.map(({ speed }) => speed)).toEqual([10, 35, 10, 35, 10]);
    expect(moves[1]).toMatchObject({ from: [1, 0, 0], to: [1, 0, 0] });
  });

  test("G10 with L or P sets tool data and retracts nothing; without a length there is nothing to retract", () => {
    expect(run(["G10 L2 P1 X0", "G10 P0 S200"]).moves).toEqual([]);
    const bare = tern({ motion: { firmwareRetract: { lengthMm: 0, speedMmS: 20 } } });
    expect(run(["G10", "G11"], bare).moves).toEqual([]);
  });

  test("an absolute position survives firmware retraction", () => {
    expect(run(["G1 X1 E1", "G10", "G11", "G1 X2 E2"]).fed).toEqual([1, -1, 1, 1]);
  });
});

describe("speed", () => {
  test("is the machine's own until the first F, then stays until the next", () => {
    expect(run(["G1 X1", "G1 X2 F600", "G0 X3", "G1 X4 F1200"]).moves.map(({ speed }) => speed)).toEqual([
      25, 10, 10, 20,
    ]);
  });

  test("T2: F is units per minute", () => {
    expect(run(["G1 X100 F1500"]).last.speed).toBe(25);
  });

  test("is scaled by M220, in force until the next, not compounded", () => {
    const { moves } = run([
      "G1 X1 F600",
      "M220 S50",
      "G1 X2",
      "M220 S200",
      "G1 X3 F300",
      "M220",
      "G1 X4",
      "M220 S0",
      "G1 X5",
    ]);
    expect(moves.map(({ speed }) => speed)).toEqual([10, 5, 10, 10, 10]);
  });

  test("of zero or less is no speed: it is told, and the one before stays", () => {
    const recorder = run(["G1 X1 F600", "G1 X2 F0", "G1 X3 F-5 "]);
    expect(recorder.moves.map(({ speed }) => speed)).toEqual([10, 10, 10]);
    expect(recorder.oddities).toEqual(["feed-not-positive", "feed-not-positive"]);
  });
});

describe("waits", () => {
  const waits = (lines: string[], motion: object = {}) => run(lines, tern({ motion })).waits;

  test("G4: P500 is half a second on one firmware family and 500 s on another; S is seconds on both, and wins", () => {
    expect(waits(["G4 P500"])).toEqual([["dwell", 0.5]]);
    expect(waits(["G4 P500"], { dwellP: "s" })).toEqual([["dwell", 500]]);
    expect(waits(["G4 S2", "G4 P500 S2"])).toEqual([
      ["dwell", 2],
      ["dwell", 2],
    ]);
    expect(waits(["G4", "G4 S-3", "G4 P"])).toEqual([
      ["dwell", 0],
      ["dwell", 0],
      ["dwell", 0],
    ]);
  });

  test("homing, levelling, temperatures, tools and an emptied queue are told", () => {
    expect(waits(["G28", "G29", "G30", "M109 S200", "M190 R60", "M116", "M191 S40", "M400", "T1"])).toEqual([
      ["home", null],
      ["home", null],
      ["home", null],
      ["temperature", null],
      ["temperature", null],
      ["temperature", null],
      ["temperature", null],
      ["dwell", 0],
      ["tool", null],
    ]);
  });

  test("T255 and T1000 are switches, not tools; a T word beside a command is its parameter", () => {
    expect(waits(["T255", "T1000", "T-1", "M104 T1 S200", "G10 P1 T0", "T"])).toEqual([]);
    expect(waits(["T0", "t 3"])).toEqual([
      ["tool", null],
      ["tool", null],
    ]);
  });

  test("set-points are heard with the wait or without, from S or R", () => {
    const { nozzleC, bedC } = run(["M104 S200", "M109 R210", "M109", "M140 S60", "M190 S0", "M141 S0;text"]);
    expect(nozzleC).toEqual([200, 210]);
    expect(bedC).toEqual([60, 0]);
  });
});

describe("limits in the file", () => {
  test("are handed on in millimetres, with what is not stated left out", () => {
    expect(run(["M204 S500", "M204 P500 T800 R900", "M204 P500"]).changes).toEqual([
      { printAccel: 500, travelAccel: 500, retractAccel: undefined },
      { printAccel: 500, travelAccel: 800, retractAccel: 900 },
      { printAccel: 500, travelAccel: undefined, retractAccel: undefined },
    ]);
    expect(run(["M201 X500 E100", "M203 Z5", "G20", "M203 X1", "G21", "M205 X8 J.02", "M204 S0"]).changes).toEqual([
      { axisAccel: { x: 500, e: 100 } },
      { axisSpeed: { z: 5 } },
      { axisSpeed: { x: 25.4 } },
      { jerk: { x: 8 }, deviation: 0.02 },
      { printAccel: undefined },
    ]);
  });
});

describe("several commands on a line", () => {
  test("are told; settings act before the motion, whatever their order", () => {
    const recorder = run(["G1 X10 F600", "G91 G1 X5", "G1 X5 G90", "G21 G90 M83"]);
    expect(recorder.position[0]).toBe(5);
    expect(recorder.oddities).toEqual(["several-commands", "several-commands", "several-commands"]);
  });

  test("settings of plane, unit and distance leave the axis words to the motion word in force", () => {
    expect(run(["G1 X1 F600", "G20 G90 X2"]).position[0]).toBe(50.8);
    expect(run(["G1 X1 F600", "G90 M82 X3"]).position[0]).toBe(3);
    expect(run(["G1 X1 F600", "G28 G90 X3"]).position[0]).toBe(0);
  });

  test("a temperature beside a motion is heard, a dwell is no motion", () => {
    const recorder = run(["M104 S200 G1 X5 F600"]);
    expect(recorder.nozzleC).toEqual([200]);
    expect(recorder.position[0]).toBe(5);
  });
});

test("G3: the words of a line mean the same in all 120 orders", () => {
  const words = ["G1", "X-7.0", "(foo)", "F600", "E.5"];
  const orders = (rest: string[]): string[][] =>
    rest.length === 0
      ? [[]]
      : rest.flatMap((word) => orders(rest.filter((other) => other !== word)).map((tail) => [word, ...tail]));
  const lines = orders(words).map((order) => order.join(" "));
  expect(lines).toHaveLength(120);
  const expected = run(["G1 X3 F900", "G1 X-7 E.5 F600"]).moves;
  for (const line of lines) expect(run(["G1 X3 F900", line]).moves).toEqual(expected);
});

describe("numbers beyond any machine", () => {
  const huge = "9".repeat(400);

  test("make a line that is told and not counted, on the plain path as off it", () => {
    for (const line of [
      `G1 X${huge}`,
      "G1 X2000000000 Y1",
      `G92 X${huge}`,
      `M104 S${huge}`,
      `G4 S${huge}`,
      `G4 P${huge}`,
      `G1 X2 A${huge}`,
    ]) {
      const recorder = run(["G1 X1", line, `${line} ;x`, "G1 Y1"]);
      expect(recorder.oddities).toEqual(["number-too-large", "number-too-large"]);
      expect(recorder.position).toEqual([1, 1, 0]);
      expect(recorder.waits).toEqual([]);
      expect(recorder.nozzleC).toEqual([]);
    }
  });

  test("the largest number of the plain path is read the same off it", () => {
    const far = (line: string) => run(["G1 F600", line]);
    expect(far("G1 X999999999")).toEqual(far("G1 X999999999 ;x"));
    expect(far("G1 X100000000")).toEqual(far("G1 X100000000 ;x"));
  });
});

test("G91 moves and their absolute twins are the same", () => {
  const step = fc.integer({ min: -4000, max: 4000 }).map((n) => n / 8);
  fc.assert(
    fc.property(fc.array(fc.tuple(step, step, step), { minLength: 1, maxLength: 20 }), (steps) => {
      const at = [0, 0, 0];
      const absolute = steps.map((by) => {
        for (const axis of [0, 1, 2]) at[axis] += by[axis];
        return `G1 X${at[0]} Y${at[1]} Z${at[2]}`;
      });
      const relative = ["G91", ...steps.map((by) => `G1 X${by[0]} Y${by[1]} Z${by[2]}`)];
      expect(run(relative).moves).toEqual(run(absolute).moves);
    }),
  );
});
