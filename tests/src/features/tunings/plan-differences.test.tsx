import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, test, vi } from "vitest";
import { DifferenceRuns } from "#src/features/tunings/difference-runs.tsx";
import { type PlanSide, planDifferences } from "#src/features/tunings/plan-differences.ts";
import { predictionOf } from "#tests/src/features/prediction/predictions.ts";

const side = (duties: number[], prediction?: PlanSide["prediction"]): PlanSide => ({
  plan: { layers: duties.map((lamp, i) => ({ index: i + 1, duty: { fan: 0.4, lamp }, reason: {} })) },
  prediction,
});

test("equal plans have no difference", () => {
  expect(planDifferences(side([0.1, 0.2]), side([0.1, 0.2]))).toEqual([]);
  const same = predictionOf(2);
  expect(planDifferences(side([0.1, 0.2], same), side([0.1, 0.2], same))).toEqual([]);
});

test("layers that differ in a row are one run, with the channel and both spans", () => {
  const runs = planDifferences(side([0.1, 0.2, 0.3, 0.4, 0.5]), side([0.1, 0.6, 0.7, 0.4, 0.9]));
  expect(runs.map(({ first, last, channels }) => ({ first, last, channels }))).toEqual([
    { first: 2, last: 3, channels: [{ id: "lamp", before: [0.2, 0.3], after: [0.6, 0.7] }] },
    { first: 5, last: 5, channels: [{ id: "lamp", before: [0.5, 0.5], after: [0.9, 0.9] }] },
  ]);
});

test("a run ends where the predicted state changes, and tells how much warmer it gets", () => {
  const warm = predictionOf(3, (i) => ({
    interlayerC: 150 + i,
    crystallinity: 0.3,
    verdicts: { state: i < 2 ? "undecided" : "semi-crystalline", reaches: null, solid: true, welds: true },
  }));
  const runs = planDifferences(side([0, 0, 0], predictionOf(3)), side([0.5, 0.5, 0.5], warm));
  expect(runs).toMatchObject([
    { first: 1, last: 2, interlayerC: [49, 49], states: { before: "amorphous", after: "undecided" } },
    { first: 3, last: 3, states: { before: "amorphous", after: "semi-crystalline" } },
  ]);
  expect(runs[0].crystallinity?.[0]).toBeCloseTo(0.29, 9);
});

test("layers whose duties agree are listed where heat from below changes them", () => {
  const warmed = predictionOf(2, (i) => ({ interlayerC: i === 0 ? 101.4 : 110 }));
  const runs = planDifferences(side([0.1, 0.1], predictionOf(2)), side([0.1, 0.1], warmed));
  expect(runs).toMatchObject([{ first: 2, last: 2, channels: [], interlayerC: [8, 8] }]);
});

test("a channel that only one side drives differs everywhere", () => {
  const without = { plan: { layers: [{ index: 1, duty: { fan: 0.4 }, reason: {} }] } };
  const [run] = planDifferences(without, side([0.2]));
  expect(run.channels).toEqual([{ id: "lamp", before: undefined, after: [0.2, 0.2] }]);
});

test("the list reads run by run and pins the first layer of each", async () => {
  const onPin = vi.fn();
  const runs = planDifferences(side([0.1, 0.2, 0.3], predictionOf(3)), side([0.1, 0.6, 0.7], predictionOf(3)));
  render(<DifferenceRuns runs={runs} onPin={onPin} />);
  const row = within(screen.getByRole("region", { name: "Differences" })).getAllByRole("row")[1];
  expect(
    within(row)
      .getAllByRole("cell")
      .map(({ textContent }) => textContent),
  ).toEqual(["2–3", "lamp", "0.200 to 0.300", "0.600 to 0.700", "0", "0.000", "amorphous"]);
  await userEvent.click(within(row).getByRole("button"));
  expect(onPin).toHaveBeenCalledWith(2);
});
