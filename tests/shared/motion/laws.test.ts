import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import type { Machine } from "#shared/formats/machine.ts";
import { Planner } from "#shared/motion/planner.ts";
import { lengthOf, plan, type Step, sum, travel } from "#tests/helpers/planning.ts";
import { cutOne, cuttable, path } from "#tests/helpers/steps.ts";
import { EVERY_RULE, SQUARE_CORNER, ternCornering } from "#tests/helpers/tern.ts";
import { wholeFilePlan } from "#tests/shared/motion/whole-file-plan.ts";

// Many runs, on a computer that may be busy with other things.
vi.setConfig({ testTimeout: 60_000 });

const changed = (machine: Machine, motion: Partial<Machine["motion"]>): Machine => ({
  ...machine,
  motion: { ...machine.motion, ...motion },
});

/** Every acceleration of the machine, those of its axes too, times a factor. */
function livelier(machine: Machine, factor: number): Machine {
  const { accelMmS2, axes } = machine.motion;
  const { print, travel: free, retract } = accelMmS2;
  return changed(machine, {
    accelMmS2: { print: print * factor, travel: free * factor, retract: retract * factor },
    axes: Object.fromEntries(
      Object.entries(axes).map(([axis, limits]) => [
        axis,
        limits && { ...limits, maxAccelMmS2: limits.maxAccelMmS2 && limits.maxAccelMmS2 * factor },
      ]),
    ),
  });
}

const ROUNDING = 1e-12;

/** Largest relative difference of two lists of durations. */
const apart = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((worst, seconds, k) => Math.max(worst, Math.abs(seconds / b[k] - 1)), 0);

/** How much faster any move of the first list is than its twin, as a share of its duration. */
const gain = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((worst, seconds, k) => Math.max(worst, 1 - seconds / b[k]), 0);

describe.each(EVERY_RULE)("with %s", (_, machine) => {
  test("moves settled as they stream by take what they take when all are planned at once", () => {
    let mostBatches = 0;
    fc.assert(
      fc.property(path(160, 60), (steps) => {
        const expected = wholeFilePlan(steps, machine);
        const { timeS, totalS, batches } = plan(steps, machine);
        mostBatches = Math.max(mostBatches, batches);
        expect(timeS).toHaveLength(expected.length);
        expect(apart(timeS, expected)).toBeLessThan(1e-11);
        expect(Math.abs(totalS / sum(expected) - 1)).toBeLessThan(ROUNDING);
      }),
      { numRuns: 15 },
    );
    expect(mostBatches).toBeGreaterThan(2);
  });

  test("no move is faster than distance over feed, and every duration is a number above zero", () => {
    fc.assert(
      fc.property(path(30), (steps) => {
        const { timeS, lengthMm } = plan(steps, machine);
        expect(timeS.every((seconds) => seconds > 0 && Number.isFinite(seconds))).toBe(true);
        expect(
          gain(
            timeS,
            steps.map((step) => lengthOf(step) / step.speedMmS),
          ),
        ).toBeLessThan(ROUNDING);
        expect(apart(lengthMm, steps.map(lengthOf))).toBeLessThan(ROUNDING);
      }),
      { numRuns: 40 },
    );
  });

  // With a least cruise a peak belongs to a whole move: a move cut in two may take its peak elsewhere, and a little more time.
  const mayWait =
    machine.motion.cornering.rule === "square-corner-velocity" && machine.motion.cornering.cruiseRatio > 0;

  test(`cutting a straight move in two ${mayWait ? "makes nothing faster, and next to nothing slower" : "changes nothing"}`, () => {
    fc.assert(
      fc.property(cuttable, ({ steps, at, share }) => {
        const whole = plan(steps, machine);
        const cut = plan(cutOne(steps, at, share), machine);
        const change = cut.totalS / whole.totalS - 1;
        expect(change).toBeGreaterThan(-1e-9);
        expect(change).toBeLessThan(mayWait ? 0.005 : 1e-9);
        if (!mayWait) expect(Math.abs((cut.timeS[at] + cut.timeS[at + 1]) / whole.timeS[at] - 1)).toBeLessThan(1e-9);
      }),
    );
  });

  test("a controller that sees fewer blocks is never faster in any move, and one that sees all is the same", () => {
    fc.assert(
      fc.property(path(60, 20), fc.integer({ min: 1, max: 40 }), (steps, blocks) => {
        const full = plan(steps, machine);
        const few = plan(steps, changed(machine, { lookAhead: blocks }));
        const more = plan(steps, changed(machine, { lookAhead: blocks + 1 }));
        const all = plan(steps, changed(machine, { lookAhead: 100_000 }));
        expect(gain(few.timeS, full.timeS)).toBeLessThan(1e-11);
        expect(apart(all.timeS, full.timeS)).toBeLessThan(1e-11);
        expect(more.totalS).toBeLessThanOrEqual(few.totalS * (1 + ROUNDING));
      }),
      { numRuns: 15 },
    );
  });

  test("with every acceleration doubled nothing takes longer", () => {
    fc.assert(
      fc.property(path(30), (steps) => {
        expect(plan(steps, livelier(machine, 2)).totalS).toBeLessThanOrEqual(
          plan(steps, machine).totalS * (1 + ROUNDING),
        );
      }),
      { numRuns: 40 },
    );
  });

  test("a path has the same duration wherever it is turned about the vertical", () => {
    const free = changed(machine, { axes: { e: machine.motion.axes.e, z: machine.motion.axes.z } });
    fc.assert(
      fc.property(path(12), (steps) => {
        const quarter = steps.map((step): Step => ({ ...step, dx: -step.dy, dy: step.dx }));
        expect(plan(quarter, free).totalS / plan(steps, free).totalS).toBeCloseTo(1, 9);
      }),
      { numRuns: 25 },
    );
  });
});

test("one block ahead means that every move must be able to stop within itself", () => {
  const machine = ternCornering(SQUARE_CORNER, { lookAhead: 1 });
  const steps = Array.from({ length: 20 }, () => travel(1, 0, 400));
  const { timeS } = plan(steps, machine);
  const slowest = plan([travel(1, 0, 400)], machine).totalS;
  for (const seconds of timeS) expect(seconds).toBeLessThanOrEqual(slowest);
  expect(sum(timeS)).toBeGreaterThan(plan(steps, ternCornering(SQUARE_CORNER)).totalS);
});

describe("very short moves", () => {
  const lazy = ternCornering(SQUARE_CORNER, { accelMmS2: { print: 50, travel: 50, retract: 50 } });
  function* crumbs(count: number): Generator<Step> {
    for (let k = 0; k < count; k++) yield travel(0.001, 0, 200);
  }

  test("that never let a speed settle are planned in a bounded window, with a stop where it is full", () => {
    const { totalS, forcedStops, timeS } = plan(crumbs(150_000), lazy);
    expect(forcedStops).toBe(1);
    expect(timeS).toHaveLength(150_000);
    expect(timeS.every((seconds) => seconds > 0 && Number.isFinite(seconds))).toBe(true);
    const free = plan([travel(150, 0, 200)], lazy).totalS;
    expect(totalS).toBeGreaterThan(free);
    expect(totalS).toBeLessThan(2 * free);
  });

  test("that fit the window need no stop", () => {
    const count = 100_000;
    const { totalS, forcedStops } = plan(crumbs(count), lazy);
    expect(forcedStops).toBe(0);
    expect(totalS / plan([travel(count / 1000, 0, 200)], lazy).totalS).toBeCloseTo(1, 9);
  });
});

test("a stop between two moves is a stop: each takes what it takes alone", () => {
  const machine = ternCornering(SQUARE_CORNER);
  const times: number[] = [];
  const planner = new Planner(machine.motion, (count) => times.push(...planner.timeS.subarray(0, count)));
  const row = Float64Array.of(0, 0, 0, 20, 0, 0, 0, 100);
  planner.add(row, 2);
  planner.stop();
  planner.add(row, 2);
  planner.stop();
  planner.stop();
  const alone = plan([travel(20, 0, 100)], machine).totalS;
  expect(times).toEqual([alone, alone]);
  expect(planner.settled).toBe(planner.added);
});
