import { render, screen, within } from "@testing-library/react";
import { expect, test } from "vitest";
import { PlanInspector } from "#src/features/layer-log/plan-inspector.tsx";
import { layerOf } from "#tests/src/layer-log/layers.ts";

const CHANNELS = [
  { id: "part-fan", kind: "fan" as const },
  { id: "lamp", kind: "heater" as const },
];
const PLAN = {
  layers: [
    {
      index: 4,
      duty: { "part-fan": 0.227 },
      reason: { "part-fan": ["zone lip: curve over deposited length at 500 mm → 0.403", "rounded to 58/255"] },
    },
  ],
  advice: [
    { layer: 4, code: "saturated", message: "Layer 4: the profile asks for more." },
    { layer: 5, code: "dead-band", message: "Layer 5: it stalls." },
  ],
};

test("a pinned layer shows its duties as sliced and as planned, with the reasons in order", () => {
  render(<PlanInspector layer={layerOf(4)} channels={CHANNELS} plan={PLAN} />);
  const reasons = within(screen.getByRole("list", { name: "Reasons for part-fan" })).getAllByRole("listitem");
  expect(reasons.map(({ textContent }) => textContent)).toEqual(PLAN.layers[0].reason["part-fan"]);
  expect(screen.getByText("0.227")).toBeTruthy();
  expect(screen.getByText("0.400")).toBeTruthy();
  expect(screen.getByText("not driven")).toBeTruthy();
});

test("only the advice that begins at this layer is shown", () => {
  render(<PlanInspector layer={layerOf(4)} channels={CHANNELS} plan={PLAN} />);
  expect(screen.getByText("Layer 4: the profile asks for more.")).toBeTruthy();
  expect(screen.queryByText("Layer 5: it stalls.")).toBeNull();
});

test("a set-point that was never given is no 0", () => {
  render(<PlanInspector layer={layerOf(4, { nozzleC: null })} channels={CHANNELS} />);
  expect(screen.getByText("Nozzle").parentElement?.textContent).toBe("Nozzle–°C");
});

test("without a pinned layer it says how to pin one", () => {
  render(<PlanInspector layer={undefined} channels={CHANNELS} />);
  expect(screen.getByText(/arrow keys/)).toBeTruthy();
});
