import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { expect, test } from "vitest";
import { Machine } from "#shared/formats/machine.ts";
import { assumedValues } from "#shared/thermal/surroundings.ts";
import { MachineEditor } from "#src/features/machines/editor/machine-editor.tsx";
import { withChannel, withoutChannel } from "#src/features/machines/editor/machine-edits.ts";
import { boxesOf, quantityAt, quantityOf, thermalGroups, withQuantity } from "#src/features/machines/thermal-fields.ts";
import { ThermalSheet } from "#src/features/machines/thermal-sheet.tsx";
import { machineOf } from "#tests/src/profile-editor/profiles.ts";

let latest: Machine;

function Editor({ start = machineOf() }: { start?: Machine }) {
  const [machine, setMachine] = useState(start);
  latest = machine;
  return <MachineEditor machine={machine} onChange={setMachine} />;
}

const box = (name: string) => screen.getByRole("textbox", { name }) as HTMLInputElement;
const lampPath = ["lamps", "lamp", "fluxAtFullWM2"];

test("every quantity that may be assumed has a field, and every field is one of the document's", () => {
  const paths = thermalGroups(machineOf()).flatMap(({ fields }) => fields.map(({ path }) => path));
  const named = paths.map((path) => `thermal.${path.join(".")}`);
  for (const { path } of assumedValues(machineOf())) expect(named).toContain(path);
  for (const path of paths) expect(Machine.safeParse(withQuantity(machineOf(), path, 1)).success).toBe(true);
});

test("what is taken out leaves no empty shells behind", () => {
  const given = withQuantity(machineOf(), lampPath, 5000);
  expect(given.thermal).toEqual({ lamps: { lamp: { fluxAtFullWM2: 5000 } } });
  expect(withQuantity(given, lampPath, undefined)).toEqual(machineOf());
});

test("one number, a range, or nothing", () => {
  expect(quantityOf({ low: undefined, typical: undefined, high: undefined })).toBeUndefined();
  expect(quantityOf({ low: undefined, typical: 4, high: undefined })).toBe(4);
  expect(quantityOf({ low: 3, typical: 4, high: 6 })).toEqual({ low: 3, typical: 4, high: 6 });
  for (const quantity of [7, { low: 1, typical: 2, high: 3 }]) expect(quantityOf(boxesOf(quantity))).toEqual(quantity);
});

test("what is said of a channel follows its id, and goes with it", () => {
  const given = withQuantity(machineOf(), lampPath, 5000);
  const renamed = withChannel(given, 1, { id: "halogen" });
  expect(quantityAt(renamed.thermal, ["lamps", "halogen", "fluxAtFullWM2"])).toBe(5000);
  expect(quantityAt(renamed.thermal, lampPath)).toBeUndefined();
  expect(withoutChannel(given, 1)).not.toHaveProperty("thermal");
});

test("an empty field shows the assumed range in grey, with where it comes from; a number takes its place", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const typical = box("Room, Air, typical, °C");
  const assumed = assumedValues(machineOf()).find(({ path }) => path === "thermal.roomAirC");
  expect([typical.value, typical.placeholder]).toEqual(["", String(assumed?.typical)]);
  await user.type(typical, "21");
  expect(latest.thermal).toEqual({ roomAirC: 21 });
  expect(box("Room, Air, low, °C").placeholder).toBe("low");
});

test("a range out of order, or not complete, is a problem at its field", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  await user.type(box("Room, Air, low, °C"), "30");
  expect(screen.getByText(/^Air must be a number between/)).toBeTruthy();
  await user.type(box("Room, Air, typical, °C"), "20");
  await user.type(box("Room, Air, high, °C"), "40");
  expect(screen.getByText(/^Air (is out of order|must be)/)).toBeTruthy();
  await user.clear(box("Room, Air, typical, °C"));
  await user.type(box("Room, Air, typical, °C"), "35");
  expect(latest.thermal).toEqual({ roomAirC: { low: 30, typical: 35, high: 40 } });
  expect(screen.getByText("Nothing to correct.")).toBeTruthy();
});

test("the sheet tells what the document gives from what is assumed", () => {
  const machine = withQuantity(machineOf(), ["roomAirC"], { low: 20, typical: 22, high: 25 });
  render(<ThermalSheet machine={machine} />);
  const room = screen.getByRole("region", { name: "Room" });
  const [, air, , bed] = within(room).getAllByRole("row");
  expect(air.textContent).toBe("Air202225°Cthis document");
  expect(bed.textContent).toContain("unverified");
  expect(bed.textContent).toContain("assumed: ");
  expect(screen.getByText(/Not calibrated/)).toBeTruthy();
});
