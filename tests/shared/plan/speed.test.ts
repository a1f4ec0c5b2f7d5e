import { expect, test } from "vitest";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { curve, fixed, layersOf, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

/** Six zones, ramped, three channels, every kind of curve, limits that bite, advice of several kinds. */
function largeTask() {
  const side = { id: "side-fan", kind: "fan", drive: { by: "named-fan", name: "side" }, minDuty: 0.1 };
  const machine = machineWith({
    fan: { minDuty: 0.12, settleS: 1.5 },
    lamp: { maxDuty: 0.85, settleS: 2, maxDutyPerS: 0.05 },
    more: [side],
  });
  const zones = Array.from({ length: 6 }, (_, z) => ({
    name: `band ${z + 1}`,
    from: z * 170,
    to: z === 5 ? undefined : (z + 1) * 170,
    rampMm: 20,
    cooling: [
      curve("part-fan", z % 2 ? "layer-time" : "deposited-length", z % 2 ? curvePoints(40) : curvePoints(3000)),
      curve("side-fan", "height", curvePoints(900)),
    ],
    heating: z % 3 ? curve("lamp", "layer-time", curvePoints(30)) : fixed("lamp", 0.9),
  }));
  const limits = { "part-fan": { maxDutyPerLayer: 0.15 }, lamp: { maxDutyPerLayer: 0.1, endRampMm: 2 } };
  const profile = profileWith(zones, { limits, bedLayers: { count: 2, duty: { "part-fan": 0, lamp: 0.4 } } });
  const layers = layersOf(5000, (i) => ({
    timeS: 2 + 40 * Math.abs(Math.sin(i / 50)),
    depositedLengthMm: 60 + 3000 * Math.abs(Math.sin(i / 70)),
  }));
  return { layers, machine, profile };
}

function curvePoints(width: number): [number, number][] {
  return Array.from({ length: 6 }, (_, i) => [((i + 0.5) * width) / 6, 0.95 - i * 0.17]);
}

// Other work on the computer only ever adds time, so the fastest run tells most.
test("5,000 layers with three channels are planned within 20 ms", {
  retry: 3,
}, () => {
  const task = largeTask();
  for (let i = 0; i < 5; i++) planDuties(task);
  const timesMs = Array.from({ length: 15 }, () => {
    const start = performance.now();
    planDuties(task);
    return performance.now() - start;
  });
  expect(Math.min(...timesMs)).toBeLessThanOrEqual(20);
});
