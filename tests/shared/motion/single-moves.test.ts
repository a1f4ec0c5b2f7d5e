import { describe, expect, test } from "vitest";
import { corpusIsHere, type MicroProgram, microPrograms } from "#tests/helpers/corpus.ts";
import { plan, planProgram, type Step, sum, travel } from "#tests/helpers/planning.ts";
import { SQUARE_CORNER, tern, ternCornering } from "#tests/helpers/tern.ts";

const accelerating = (accel: number, more: object = {}) =>
  ternCornering(SQUARE_CORNER, {
    maxSpeedMmS: 5000,
    accelMmS2: { print: accel, travel: accel, retract: accel },
    ...more,
  });

describe("T1: one straight move", () => {
  test.each([
    [100, 50, 1000, 2.05],
    [2.5, 50, 1000, 0.1],
    [1, 50, 1000, 0.0632456],
    [10, 100, 3000, 0.1333333],
    [30, 10, 20, 3.5],
  ])("%d mm at %d mm/s and %d mm/s² takes %d s from rest to rest", (mm, speed, accel, seconds) => {
    expect(plan([travel(mm, 0, speed)], accelerating(accel)).totalS).toBeCloseTo(seconds, 7);
  });

  test("20 mm entered at 10 mm/s takes 0.3672222 s, cruising at 60", () => {
    const { timeS } = plan([travel(50, 0, 10), travel(20, 0, 60)], accelerating(1500));
    expect(timeS[1]).toBeCloseTo(0.3672222, 7);
  });

  test("0.5 mm entered at 10 mm/s and left at 5 takes 0.0280058 s and never reaches 60", () => {
    const { timeS } = plan([travel(50, 0, 10), travel(0.5, 0, 60), travel(50, 0, 5)], accelerating(1500));
    expect(timeS[1]).toBeCloseTo(0.0280058, 7);
  });
});

test("T2: without inertia 100 mm at F1500 take 4 s", () => {
  const { totalS } = planProgram(["G1 X100 F1500"], accelerating(1_000_000));
  expect(totalS).toBeGreaterThan(4);
  expect(totalS).toBeCloseTo(4, 4);
});

test("T3: speeding up at 2 and slowing down at 4 mm/s² over 100 mm takes 12.2474 s", () => {
  const machine = ternCornering(
    { rule: "square-corner-velocity", speedMmS: 5 },
    { maxSpeedMmS: 100, accelMmS2: { print: 2, travel: 4, retract: 4 } },
  );
  const laid: Step = { ...travel(200 / 3, 0, 100), de: 1 };
  const { timeS, totalS } = plan([laid, travel(100 / 3, 0, 100)], machine);
  expect(totalS).toBeCloseTo(12.2474, 4);
  expect(timeS[0]).toBeCloseTo(16.3299 / 2, 4);
});

describe("limits of single axes", () => {
  const timeOf = (step: Partial<Step>, motion: object = {}): number =>
    plan([{ dx: 0, dy: 0, dz: 0, de: 0, speedMmS: 100, ...step }], accelerating(1500, motion)).totalS;

  test("a lift is as slow as its axis, and a ramp as the lift in it", () => {
    expect(timeOf({ dz: 5 })).toBeCloseTo(0.6, 9);
    expect(timeOf({ dx: 10, dz: 5 })).toBeCloseTo(0.6, 9);
  });

  test("a diagonal move may use both axes to the full", () => {
    const axes = { x: { maxSpeedMmS: 50, maxAccelMmS2: 1000 }, y: { maxSpeedMmS: 50, maxAccelMmS2: 1000 } };
    expect(timeOf({ dx: 100, speedMmS: 400 }, { axes })).toBeCloseTo(2.05, 9);
    expect(timeOf({ dx: 100, dy: 100, speedMmS: 400 }, { axes })).toBeCloseTo(2.05, 9);
  });

  test("material alone moves at the extruder's own limits, not at the path's", () => {
    expect(timeOf({ de: 6, speedMmS: 80 }, { maxSpeedMmS: 20 })).toBeCloseTo(6 / 60 + 60 / 1500, 9);
    expect(timeOf({ de: -6, speedMmS: 30 })).toBeCloseTo(6 / 30 + 30 / 1500, 9);
    expect(timeOf({ de: 6, speedMmS: 80 }, { axes: {}, maxSpeedMmS: 20 })).toBeCloseTo(6 / 20 + 20 / 1500, 9);
  });

  test("the extruder limits laying moves only where the machine says so, and always where it pulls back", () => {
    const step = { dx: 10, de: 10, speedMmS: 100 };
    expect(timeOf(step)).toBeCloseTo(timeOf({ dx: 10 }), 12);
    expect(timeOf(step, { extruderLimits: "every-move" })).toBeCloseTo(10 / 60 + 60 / 1500, 9);
    expect(timeOf({ ...step, de: -10 })).toBeCloseTo(10 / 60 + 60 / 1500, 9);
  });

  test("print, travel and retraction have accelerations of their own", () => {
    const accelMmS2 = { print: 500, travel: 3000, retract: 800 };
    const own = { accelMmS2, axes: {} };
    expect(timeOf({ dx: 20, de: 0.8 }, own)).toBeCloseTo(20 / 100 + 100 / 500, 9);
    expect(timeOf({ dx: 20 }, own)).toBeCloseTo(20 / 100 + 100 / 3000, 9);
    expect(timeOf({ de: 10, speedMmS: 40 }, own)).toBeCloseTo(10 / 40 + 40 / 800, 9);
  });
});

describe.skipIf(!corpusIsHere)("tiny programs with exact times", () => {
  const programs: MicroProgram[] = corpusIsHere ? microPrograms() : [];
  const half = tern();
  const none = ternCornering({ ...SQUARE_CORNER, cruiseRatio: 0 });

  test.each(programs.map((program): [string, MicroProgram] => [program.name, program]))("%s", (_, program) => {
    for (const [machine, expected] of [
      [half, program["mcr0.5"]],
      [none, program.mcr0],
    ] as const) {
      const { timeS, lengthMm, totalS } = planProgram(program.gcode.split("\n"), machine);
      expect(timeS).toHaveLength(expected.moves.length);
      for (const [k, move] of expected.moves.entries()) {
        expect(Math.abs(timeS[k] - move.t)).toBeLessThan(1e-9);
        expect(Math.abs(lengthMm[k] - move.d)).toBeLessThan(1e-6);
      }
      expect(Math.abs(totalS - expected.total_s)).toBeLessThan(2e-9);
      expect(totalS).toBeCloseTo(sum(timeS), 12);
    }
  });
});
