import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Reading } from "#shared/layers/reading.ts";
import { effectiveLimits } from "#shared/plan/limits.ts";
import { Boundaries } from "#shared/rewrite/boundaries.ts";
import { rateOf, type Start, staircase } from "#shared/rewrite/staircase.ts";
import { machineWith, perLayer, profileWith } from "#tests/shared/rewrite/documents.ts";
import { partLines, plain, written } from "#tests/shared/rewrite/toolpath.ts";
import { placesOf, read, tune } from "#tests/shared/rewrite/tuning.ts";

const SAME = 1e-6;
const OFF: Start = { duty: 0, sinceS: Number.NEGATIVE_INFINITY, at: 0 };

/** Travels at these instants, ascending, s. */
function boundariesAt(timesS: number[]): Boundaries {
  const travels = {
    count: timesS.length,
    offset: Float64Array.from(timesS, (_, k) => k * 10),
    line: Float64Array.from(timesS, (_, k) => k + 1),
    timeS: Float64Array.from(timesS),
  };
  const window = { start: { offset: 0 }, end: { offset: timesS.length * 10 } };
  return new Boundaries({ travels, window, layers: [], pauses: [] } as unknown as Reading, []);
}

const everyS = (stepS: number, count: number): number[] => Array.from({ length: count }, (_, k) => k * stepS);

/** How fast a lamp, or a fan, may change. */
function rate(maxDutyPerS: number, { kind = "lamp", fullScale = 1, ...limits }: Limited = {}) {
  const drive = { by: "pin", pin: 4, fullScale };
  const machine = machineWith({ [kind]: { drive, maxDutyPerS, ...limits } });
  const channel = machine.channels[kind === "fan" ? 0 : 1];
  return rateOf(channel, effectiveLimits(channel, profileWith({ lamp: 0 })));
}
type Limited = { kind?: "lamp" | "fan"; fullScale?: 1 | 255; minDuty?: number; maxDuty?: number };

/** The steps as `instant: duty`. */
function stepsAt(timesS: number[], from: Start, targets: [at: number, duty: number][], limit: ReturnType<typeof rate>) {
  const boundaries = boundariesAt(timesS);
  const wanted = targets.map(([at, duty]) => ({ at, duty }));
  return staircase(boundaries, from, wanted, timesS.length, limit).map(
    ({ at, duty }) => `${Math.round(timesS[at] * 1000) / 1000}: ${Math.round(duty * 1000) / 1000}`,
  );
}

describe("a change that needs several steps", () => {
  test("ends at the wanted boundary, one step a second", () => {
    expect(stepsAt(everyS(0.5, 40), OFF, [[20, 0.3]], rate(0.1))).toEqual(["8: 0.1", "9: 0.2", "10: 0.3"]);
  });

  test("stands at the last boundary that leaves the next step its second", () => {
    expect(stepsAt([0, 1, 4, 4.7, 6, 7.2, 9, 10], OFF, [[7, 0.4]], rate(0.1))).toEqual([
      "6: 0.1",
      "7.2: 0.2",
      "9: 0.3",
      "10: 0.4",
    ]);
  });

  test("starts at once and arrives late where there is not enough time", () => {
    expect(stepsAt(everyS(0.5, 40), OFF, [[2, 0.4]], rate(0.1))).toEqual(["0: 0.1", "1: 0.2", "2: 0.3", "3: 0.4"]);
  });

  test("goes down as it goes up", () => {
    const from = { ...OFF, duty: 0.5 };
    expect(stepsAt(everyS(0.5, 40), from, [[20, 0.25]], rate(0.1))).toEqual(["8: 0.4", "9: 0.3", "10: 0.25"]);
  });

  test("that has run late yields to the next wanted duty", () => {
    const targets: [number, number][] = [
      [0, 0.9],
      [6, 0.1],
    ];
    expect(stepsAt(everyS(0.5, 12), OFF, targets, rate(0.1))).toEqual([
      "0: 0.1",
      "1: 0.2",
      "2: 0.3",
      "3: 0.2",
      "4: 0.1",
    ]);
  });

  test("stops where the boundaries end", () => {
    expect(stepsAt(everyS(0.5, 6), OFF, [[1, 0.9]], rate(0.1))).toEqual(["0: 0.1", "1: 0.2", "2: 0.3"]);
  });

  test("waits for the step that was made before it", () => {
    const from = { duty: 0.2, sinceS: 0.5, at: 2 };
    expect(stepsAt(everyS(0.5, 12), from, [[2, 0.4]], rate(0.1))).toEqual(["1.5: 0.3", "2.5: 0.4"]);
  });
});

test("where one step of the drive is more than a second allows, single steps stand further apart", () => {
  // 1/255 at 0.002 a second: every 1.96 s.
  expect(stepsAt(everyS(0.5, 40), OFF, [[20, 3 / 255]], rate(0.002, { fullScale: 255 }))).toEqual([
    "6: 0.004",
    "8: 0.008",
    "10: 0.012",
  ]);
});

test("a step is a whole number of the drive's", () => {
  const { step } = rate(0.05, { fullScale: 255 });
  expect(step * 255).toBeCloseTo(12, 9);
});

describe("a fan's dead band", () => {
  const fan = rate(0.1, { kind: "fan", minDuty: 0.12 });

  test("is crossed at once on the way up", () => {
    expect(stepsAt(everyS(0.5, 40), OFF, [[20, 0.3]], fan)).toEqual(["8: 0.12", "9: 0.22", "10: 0.3"]);
  });

  test("is crossed at once on the way down", () => {
    const from = { ...OFF, duty: 0.3 };
    expect(stepsAt(everyS(0.5, 40), from, [[20, 0]], fan)).toEqual(["8: 0.2", "9: 0.12", "10: 0"]);
  });

  test("is no reason to go slower than allowed", () => {
    const fast = rate(0.4, { kind: "fan", minDuty: 0.12 });
    expect(stepsAt(everyS(0.5, 40), OFF, [[20, 0.3]], fast)).toEqual(["10: 0.3"]);
  });

  test("is none for a lamp", () => {
    const lamp = rate(0.1, { minDuty: 0.12 });
    expect(stepsAt(everyS(0.5, 40), OFF, [[20, 0.3]], lamp)).toEqual(["8: 0.1", "9: 0.2", "10: 0.3"]);
  });
});

test("what the file has set above the limit comes down to it at once", () => {
  const from = { ...OFF, duty: 1 };
  expect(stepsAt(everyS(0.5, 40), from, [[0, 0.4]], rate(0.1, { maxDuty: 0.6 }))).toEqual([
    "0: 0.6",
    "1: 0.5",
    "2: 0.4",
  ]);
});

test("whatever is wanted when, steps are small enough, far enough apart, and none stands in the dead band", () => {
  const task = fc.record({
    gaps: fc.array(fc.constantFrom(0, 0.2, 0.7, 1, 3), { minLength: 1, maxLength: 40 }),
    wanted: fc.uniqueArray(fc.record({ at: fc.nat(60), thousandths: fc.nat(200) }), {
      selector: ({ at }) => at,
      maxLength: 8,
    }),
    perS: fc.constantFrom(0.004, 0.05, 0.3),
    minDuty: fc.constantFrom(0, 0.12),
    first: fc.nat(200),
    at: fc.nat(5),
  });
  fc.assert(
    fc.property(task, ({ gaps, wanted, perS, minDuty, first, at }) => {
      const times = gaps.map((_, k) => gaps.slice(0, k).reduce<number>((sum, gap) => sum + gap, 0));
      const limit = rate(perS, { kind: "fan", minDuty });
      const allowed = (thousandths: number) => (thousandths < minDuty * 1000 ? 0 : thousandths / 1000);
      const targets = wanted
        .filter((target) => target.at >= at && target.at < times.length)
        .sort((a, b) => a.at - b.at)
        .map((target) => ({ at: target.at, duty: allowed(target.thousandths) }));
      const from = { duty: allowed(first), sinceS: Number.NEGATIVE_INFINITY, at };
      let before = { duty: from.duty, timeS: Number.NEGATIVE_INFINITY, at: at - 1 };
      for (const step of staircase(boundariesAt(times), from, targets, times.length, limit)) {
        const change = Math.abs(step.duty - before.duty);
        const crosses = Math.min(step.duty, before.duty) < SAME && Math.max(step.duty, before.duty) <= minDuty + SAME;
        expect(step.at).toBeGreaterThan(before.at);
        expect(change).toBeGreaterThan(SAME);
        expect(change <= limit.step + SAME || crosses).toBe(true);
        expect(times[step.at] - before.timeS).toBeGreaterThan(limit.everyS - 2 * SAME);
        expect(step.duty > SAME && step.duty < minDuty - SAME).toBe(false);
        before = { duty: step.duty, timeS: times[step.at], at: step.at };
      }
    }),
    { numRuns: 300 },
  );
});

describe("in a toolpath", () => {
  const machine = machineWith({ lamp: { maxDutyPerS: 0.1 } });

  test("the lamp climbs at travels, from the window's start on, and in the layer below a layer that wants more", () => {
    const text = written(partLines({ layers: plain(4, { rounds: 3 }) }));
    const tuned = tune(text, machine, profileWith({ lamp: perLayer(0.2, 0.2, 0.5, 0.5) }));
    const third = read(text, machine).layers[2];
    const steps = read(tuned, machine).controls.filter(({ ours, duty }) => ours && duty > 0);
    expect(steps.map(({ duty }) => Math.round(duty * 255))).toEqual([25, 50, 51, 76, 101, 126, 128]);
    expect(steps[steps.length - 1].timeS).toBeCloseTo(third.writeAt.timeS, 6);
  });

  test("the fan crosses its dead band between two steps", () => {
    const fan = machineWith({ fan: { maxDutyPerS: 0.05, minDuty: 0.12 } });
    const tuned = tune(written(partLines({ layers: plain(4) })), fan, profileWith({ fan: perLayer(0, 0, 0, 0.2) }));
    expect(placesOf(tuned).map(({ command, before }) => `${command} | ${before}`)).toEqual([
      "M106 S0 | ;LAYER:0",
      "M106 S31 | G0 X10 Y10 Z0.4 F6000",
      "M106 S43 | G0 X10 Y10 Z0.6 F6000",
      "M106 S51 | ;LAYER:3",
    ]);
  });
});
