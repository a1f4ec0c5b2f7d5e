import fc from "fast-check";
import { expect, test } from "vitest";
import { heatFlows } from "#src/features/prediction/heat-balance.ts";

const joules = fc.double({ min: -500, max: 500, noNaN: true });

test("what comes and what goes add up to the same, and each side's shares to one", () => {
  fc.assert(
    fc.property(joules, joules, joules, joules, joules, (lostJ, fromLampJ, fromCrystallisingJ, toAirJ, radiatedJ) => {
      const toBelowJ = lostJ + fromLampJ + fromCrystallisingJ - toAirJ - radiatedJ;
      const flows = { lostJ, fromLampJ, fromCrystallisingJ, toAirJ, radiatedJ, toBelowJ, timeS: 1 };
      const { from, to } = heatFlows(flows);
      const total = (side: typeof from) => side.reduce((sum, flow) => sum + flow.joules, 0);
      expect(total(from)).toBeCloseTo(total(to), 6);
      for (const side of [from, to]) {
        if (side.length === 0) continue;
        expect(side.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 9);
        expect(side.every(({ joules }) => joules > 0)).toBe(true);
      }
    }),
  );
});

test("a layer that is warmed from below says so", () => {
  const { from, to } = heatFlows({
    lostJ: 50,
    fromLampJ: 30,
    fromCrystallisingJ: 0,
    toAirJ: 70,
    radiatedJ: 30,
    toBelowJ: -20,
    timeS: 5,
  });
  expect(from).toEqual([
    { label: "its own cooling", joules: 50, share: 0.5 },
    { label: "lamp", joules: 30, share: 0.3 },
    { label: "the layers below", joules: 20, share: 0.2 },
  ]);
  expect(to.map(({ label, share }) => [label, share])).toEqual([
    ["air", 0.7],
    ["radiated", 0.3],
  ]);
});
