import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, test } from "vitest";
import { PredictedPanel } from "#src/features/prediction/predicted-panel.tsx";
import { cardOf, predictionOf } from "#tests/src/features/prediction/predictions.ts";

const margins = { belowTgC: 25, aboveTgC: 15, maxCrystallinity: 0.08, minCrystallinity: 0.2 };
const target = { state: "amorphous" as const, share: 0 };
const panel = (changes: Partial<Parameters<typeof PredictedPanel>[0]> = {}) => (
  <PredictedPanel
    prediction={predictionOf(3)}
    position={1}
    target={target}
    polymer={cardOf("peek")}
    margins={margins}
    pale={false}
    balance={null}
    {...changes}
  />
);
const rowText = (label: string) =>
  screen.getByText(label, { selector: "dt, dt *" }).closest("div")?.textContent?.replace(/\s+/g, " ");

test("numbers are shown with their band, and uncalibrated ones look it without colour", () => {
  render(panel());
  expect(rowText("Interlayer temperature")).toContain("between 82 and 132");
  const value = screen.getByText("102");
  expect(value.closest("dd")?.textContent).toBe("unverified?102");
  expect(screen.getByText("Reaches its target, amorphous, even in the worst case.")).toBeTruthy();
});

test("an uncalibrated prediction lists what was assumed, with range and source", async () => {
  render(panel());
  await userEvent.click(screen.getByText("1 value is assumed"));
  const table = screen.getByRole("region", { name: "Assumed values" });
  expect(within(table).getByRole("rowheader").textContent).toBe("Air, °Cfrom memory of the trade");
  expect(
    within(table)
      .getAllByRole("cell")
      .map(({ textContent }) => textContent),
  ).toEqual(["18", "23", "30"]);
});

test("a calibrated prediction says which calibration it rests on, and nothing else is said", () => {
  render(panel({ prediction: { ...predictionOf(3), calibration: "tern 3", assumed: [] } }));
  expect(screen.getByText("tern 3")).toBeTruthy();
  expect(screen.queryByText("Not calibrated")).toBeNull();
  expect(screen.getByText("102").closest("dd")?.textContent).toBe("102");
});

test("limits of the card are marked where nobody has verified them; the profile's own are not the card's", async () => {
  render(panel());
  await userEvent.click(screen.getByText("Measured against"));
  expect(rowText("Tg")).toBe("Tg143°C");
  expect(rowText("Solid below")).toBe("Solid belowunverified?173°C");
  expect(rowText("Amorphous: below Tg by")).toBe("Amorphous: below Tg bythe profile's own25K");
});

test("nothing is said about crystals of a polymer that has none", () => {
  render(panel({ polymer: cardOf("pei") }));
  expect(screen.queryByText("Crystallinity")).toBeNull();
  expect(screen.queryByText(/Reaches its target/)).toBeNull();
});

test("a prediction of an older draft says that it is being computed anew", () => {
  render(panel({ pale: true }));
  expect(screen.getByRole("region", { name: "Predicted" }).getAttribute("aria-busy")).toBe("true");
  expect(screen.getByText("being computed anew")).toBeTruthy();
});
