import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { expect, test } from "vitest";
import { SAFETY_CHECKLIST } from "#shared/contract/safety-checklist.ts";
import { Machine } from "#shared/formats/machine.ts";
import { MachineEditor } from "#src/features/machines/editor/machine-editor.tsx";
import {
  asKind,
  channelAdded,
  driveBy,
  newMachine,
  withAxisLimit,
} from "#src/features/machines/editor/machine-edits.ts";
import { machineOf } from "#tests/src/profile-editor/profiles.ts";

let latest: Machine;

function Editor({ start = machineOf() }: { start?: Machine }) {
  const [machine, setMachine] = useState(start);
  latest = machine;
  return <MachineEditor machine={machine} onChange={setMachine} />;
}

const channel = (id: string) => screen.getByRole("group", { name: `Channel ${id}` });

test("a new channel gets an id and an output that no other has", () => {
  const added = channelAdded(channelAdded(machineOf(), "fan"), "heater");
  expect(added.channels.map(({ id, drive }) => [id, "index" in drive ? drive.index : undefined])).toEqual([
    ["part-fan", 0],
    ["lamp", 2],
    ["part-fan-2", 1],
    ["lamp-2", 3],
  ]);
  expect(Machine.safeParse(added).success).toBe(true);
});

test("a machine to begin from lacks a name and nothing else", () => {
  const checked = Machine.safeParse(newMachine());
  expect(checked.error?.issues.map(({ path }) => path.join("."))).toEqual(["name"]);
});

test("another command keeps what both forms have", () => {
  const pin = driveBy({ by: "fan-index", index: 2, fullScale: 1 }, "pin");
  expect(pin).toEqual({ by: "pin", pin: 2, fullScale: 1 });
  expect(driveBy({ by: "named-fan", name: "side" }, "named-pin")).toEqual({
    by: "named-pin",
    name: "side",
    fullScale: 1,
  });
});

test("a channel that changes its kind drops what the other kind does not have", () => {
  const lamp = { ...machineOf().channels[1], idleDuty: 0.1 };
  expect(asKind(lamp, "fan").idleDuty).toBe(0);
  expect(asKind({ ...machineOf().channels[0], startBoostS: 0.2 }, "heater").startBoostS).toBe(0);
});

test("an axis without limits is left out of the document", () => {
  const limited = withAxisLimit(machineOf(), "z", "maxSpeedMmS", 10);
  expect(limited.motion.axes).toEqual({ z: { maxSpeedMmS: 10 } });
  expect(withAxisLimit(limited, "z", "maxSpeedMmS", undefined).motion.axes).toEqual({});
});

test("channels are added and removed, and undo brings them back", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  await user.click(screen.getByRole("button", { name: "Add a heater" }));
  expect(channel("lamp-2")).toBeTruthy();
  await user.click(screen.getByRole("button", { name: "Remove lamp" }));
  expect(latest.channels.map(({ id }) => id)).toEqual(["part-fan", "lamp-2"]);
  await user.click(screen.getByRole("button", { name: "Undo" }));
  expect(latest.channels.map(({ id }) => id)).toEqual(["part-fan", "lamp", "lamp-2"]);
});

test("two channels on one output are a problem at the second one's command", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const index = within(channel("lamp")).getByRole("textbox", { name: "Index" });
  await user.clear(index);
  await user.type(index, "0");
  expect(within(channel("lamp")).getByText(/This output is the output of channels\[0\]/)).toBeTruthy();
  expect(screen.getByText("To correct: Channel lamp, command")).toBeTruthy();
});

test("a drive by name asks for the name that the firmware knows", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const fan = channel("part-fan");
  await user.selectOptions(within(fan).getByRole("combobox", { name: "Command" }), "named-fan");
  const name = within(fan).getByRole("textbox", { name: "Name in the firmware" });
  expect(within(fan).getByText(/Name cannot stand in a command/)).toBeTruthy();
  await user.type(name, "part_cooling");
  expect(latest.channels[0].drive).toEqual({ by: "named-fan", name: "part_cooling" });
  expect(within(fan).queryByText(/cannot stand/)).toBeNull();
});

test("a start boost is for fans and an idle duty for heaters", () => {
  render(<Editor />);
  expect(within(channel("part-fan")).queryByRole("textbox", { name: "Idle duty 0–1" })).toBeNull();
  expect(within(channel("lamp")).queryByRole("textbox", { name: "Start boost s" })).toBeNull();
});

test("corners are described by one of three rules, each with its own numbers", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  await user.selectOptions(screen.getByRole("combobox", { name: "Corners by" }), "axis-jerk");
  const jerk = screen.getByRole("textbox", { name: "Largest jump of Z mm/s" });
  await user.clear(jerk);
  await user.type(jerk, "0.4");
  expect(latest.motion.cornering).toEqual({ rule: "axis-jerk", jerkMmS: { x: 9, y: 9, z: 0.4, e: 4 } });
});

test("a pause listed twice is a problem at the second", async () => {
  const user = userEvent.setup();
  render(<Editor start={{ ...machineOf(), pauses: [{ command: "M0", blocking: true }] }} />);
  await user.click(screen.getByRole("button", { name: "Add a pause" }));
  const [, second] = screen.getAllByRole("textbox", { name: "Command" });
  await user.type(second, "m0");
  expect(screen.getByText(/"m0" is listed already/)).toBeTruthy();
});

test("with a heater the cautions stand on the page, without one they do not", async () => {
  const { unmount } = render(<Editor />);
  expect(screen.getByText(SAFETY_CHECKLIST[0].text)).toBeTruthy();
  unmount();
  render(<Editor start={{ ...machineOf(), channels: machineOf().channels.slice(0, 1) }} />);
  expect(screen.queryByText(SAFETY_CHECKLIST[0].text)).toBeNull();
});
