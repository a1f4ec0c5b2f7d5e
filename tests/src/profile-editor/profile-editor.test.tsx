import { fireEvent, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { expect, test, vi } from "vitest";
import type { Profile } from "#shared/formats/profile.ts";
import { ProfileEditor, type ProfileEditorProps } from "#src/features/profiles/editor/profile-editor.tsx";
import { machineOf, PART, profileOf } from "#tests/src/profile-editor/profiles.ts";

let latest: Profile;
const machine = machineOf();

function Editor({ start = profileOf(), ...rest }: { start?: Profile } & Partial<ProfileEditorProps>) {
  const [profile, setProfile] = useState(start);
  latest = profile;
  return <ProfileEditor profile={profile} onChange={setProfile} machine={machine} part={PART} {...rest} />;
}

const border = () => screen.getByRole("slider", { name: "Border between base and lip" });
const choose = (zone: string) => fireEvent.click(screen.getByRole("button", { name: new RegExp(`^Zone ${zone},`) }));

test("a border moves layer by layer with the arrow keys", () => {
  render(<Editor />);
  expect(border().getAttribute("aria-valuetext")).toBe("6 mm");
  fireEvent.keyDown(border(), { key: "ArrowUp" });
  expect(border().getAttribute("aria-valuetext")).toBe("6.2 mm");
  fireEvent.keyDown(border(), { key: "PageDown" });
  expect(latest.zones.map(({ from, to }) => [from, to])).toEqual([
    [0, 4.2],
    [4.2, undefined],
  ]);
});

test("a border is dragged to the layer under the pointer, and one undo takes the whole drag back", async () => {
  render(<Editor />);
  // The bands cover 8 to 512 px for 9 mm: 56 px a mm.
  fireEvent.pointerDown(border(), { clientY: 176, pointerId: 1 });
  fireEvent.pointerMove(border(), { clientY: 300 });
  fireEvent.pointerMove(border(), { clientY: 512 - 3.05 * 56 });
  fireEvent.pointerUp(border());
  expect(latest.zones[0].to).toBe(3);
  fireEvent.pointerMove(border(), { clientY: 100 });
  expect(latest.zones[0].to).toBe(3);
  await userEvent.click(screen.getByRole("button", { name: "Undo" }));
  expect(latest.zones[0].to).toBe(6);
  await userEvent.click(screen.getByRole("button", { name: "Redo" }));
  expect(latest.zones[0].to).toBe(3);
});

test("every change is told at once, while the hand still drags", () => {
  const onChange = vi.fn();
  render(<ProfileEditor profile={profileOf()} onChange={onChange} machine={machine} part={PART} />);
  fireEvent.pointerDown(border(), { clientY: 176, pointerId: 1 });
  fireEvent.pointerMove(border(), { clientY: 300 });
  expect(onChange).toHaveBeenCalledTimes(1);
});

test("a curve's point moves by keyboard and stays between its neighbours", () => {
  render(<Editor />);
  const plot = screen.getByRole("group", { name: "Duty of part-fan over layer time, zone base" });
  const point = within(plot).getByRole("slider", { name: "Point 2 of 3" });
  fireEvent.keyDown(point, { key: "ArrowUp" });
  fireEvent.keyDown(point, { key: "ArrowRight" });
  expect(latest.zones[0].cooling[0]).toMatchObject({
    points: [
      [3, 0.55],
      [expect.closeTo(10.2), 0.31],
      [40, 0.12],
    ],
  });
  fireEvent.keyDown(point, { key: "Delete" });
  expect(latest.zones[0].cooling[0]).toMatchObject({
    points: [
      [3, 0.55],
      [40, 0.12],
    ],
  });
});

test("a curve's point is dragged on the plot", () => {
  render(<Editor />);
  const plot = screen.getByRole("group", { name: "Duty of part-fan over layer time, zone base" });
  vi.spyOn(plot, "getBoundingClientRect").mockReturnValue(new DOMRect(0, 0, 380, 188));
  const point = within(plot).getByRole("slider", { name: "Point 2 of 3" });
  fireEvent.pointerDown(point, { pointerId: 1 });
  // 34 to 368 px are 0 to 46 s, 148 to 10 px are duties 0 to 1.
  fireEvent.pointerMove(point, { clientX: 34 + (20 / 46) * 334, clientY: 148 - 0.5 * 138 });
  fireEvent.pointerUp(point);
  expect(latest.zones[0].cooling[0]).toMatchObject({
    points: [
      [3, 0.55],
      [20, 0.5],
      [40, 0.12],
    ],
  });
});

test("the same curve in a table: type, add, remove", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const duty = screen.getByRole("textbox", { name: "Point 2, duty" });
  await user.clear(duty);
  await user.type(duty, "0,35");
  expect(latest.zones[0].cooling[0]).toMatchObject({
    points: [
      [3, 0.55],
      [10, 0.35],
      [40, 0.12],
    ],
  });
  await user.click(screen.getByRole("button", { name: "Add a point after point 3" }));
  await user.click(screen.getByRole("button", { name: "Remove point 1" }));
  expect(latest.zones[0].cooling[0]).toMatchObject({
    points: [
      [10, 0.35],
      [40, 0.12],
      [70, 0.12],
    ],
  });
});

test("what is wrong stands at its field, and the plan-ready profile comes back once it is put right", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const duty = screen.getByRole("textbox", { name: "Duty 0–1" });
  await user.clear(duty);
  await user.type(duty, "62");
  expect(duty.getAttribute("aria-invalid")).toBe("true");
  const said = document.getElementById(duty.getAttribute("aria-describedby") ?? "");
  expect(said?.textContent).toMatch(/^Duty must be between 0 and 1, got 62\./);
  expect(screen.getByText("1 thing to correct")).toBeTruthy();
  await user.clear(duty);
  expect(screen.getByText(/^Duty is missing/)).toBeTruthy();
  await user.type(duty, "0.6");
  expect(duty.getAttribute("aria-invalid")).toBeNull();
  expect(screen.getByText("Nothing to correct.")).toBeTruthy();
});

test("what is no number is said to be none, and kept as it was typed", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const duty = screen.getByRole("textbox", { name: "Duty 0–1" });
  await user.clear(duty);
  await user.type(duty, "six");
  await user.tab();
  expect(duty).toHaveProperty("value", "six");
  expect(screen.getByText(/^Duty is no number/)).toBeTruthy();
});

test("points that are not sorted are a problem at the point that is out of order", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const x = screen.getByRole("textbox", { name: "Point 2, layer time in s" });
  await user.clear(x);
  await user.type(x, "2");
  expect(x.getAttribute("aria-invalid")).toBe("true");
  expect(screen.getByText(/Point 2: layer time must be greater than the x of the point before \(3\)/)).toBeTruthy();
});

test("a limit wider than the machine's is a problem at that limit, with the machine's beside it", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  await user.click(screen.getByText("Limits and timing"));
  const table = screen.getByRole("table", { name: "Limits and timing" });
  await user.type(within(table).getByRole("textbox", { name: "Most duty 0–1, lamp" }), "0.95");
  expect(within(table).getByText(/Most duty 0–1 is 0.95, above the machine's 0.85/)).toBeTruthy();
  expect(within(table).getByText("machine: 0.85")).toBeTruthy();
});

test("a problem in another zone leads to that zone", async () => {
  const user = userEvent.setup();
  const start = profileOf();
  start.zones[1].heating = [{ channel: "lamp", rule: "fixed", duty: 3 }];
  render(<Editor start={start} />);
  expect(screen.queryByRole("region", { name: "Zone lip" })).toBeNull();
  await user.click(screen.getByText("1 thing to correct"));
  await user.click(screen.getByRole("button", { name: /^Zone lip, heating/ }));
  expect(screen.getByRole("region", { name: "Zone lip" })).toBeTruthy();
});

test("a zone without a rule for a channel that others drive says so and can be given one", async () => {
  const start = profileOf();
  start.zones[1].heating = [];
  render(<Editor start={start} />);
  choose("lip");
  expect(screen.getByText(/This zone .*has no rule for "lamp"/)).toBeTruthy();
  await userEvent.click(screen.getByRole("button", { name: "Add a rule for lamp" }));
  expect(latest.zones[1].heating).toEqual([{ channel: "lamp", rule: "fixed", duty: 0 }]);
});

test("Ctrl+Z takes back what was typed in one field in one step", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  await user.type(screen.getByRole("textbox", { name: "Zone" }), " ring");
  expect(latest.zones[0].name).toBe("base ring");
  await user.keyboard("{Control>}z{/Control}");
  expect(latest.zones[0].name).toBe("base");
  await user.keyboard("{Control>}{Shift>}z{/Shift}{/Control}");
  expect(latest.zones[0].name).toBe("base ring");
});

test("zones are split, removed and added", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  await user.click(screen.getByRole("button", { name: "Split this zone" }));
  expect(latest.zones.map(({ name, from }) => [name, from])).toEqual([
    ["base", 0],
    ["base 2", 3],
    ["lip", 6],
  ]);
  choose("base 2");
  await user.click(screen.getByRole("button", { name: "Remove this zone" }));
  expect(latest.zones.map(({ name, from }) => [name, from])).toEqual([
    ["base", 0],
    ["lip", 6],
  ]);
  await user.click(screen.getByRole("button", { name: "Add a zone on top" }));
  expect(screen.getByRole("region", { name: "Zone lip 2" })).toBeTruthy();
});

test("the rule's kind and quantity change without losing the channel", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  const lamp = screen.getByRole("group", { name: "lamp in zone base" });
  await user.selectOptions(within(lamp).getByRole("combobox", { name: "Rule" }), "curve");
  await user.selectOptions(within(lamp).getByRole("combobox", { name: "Read over" }), "height");
  expect(latest.zones[0].heating[0]).toMatchObject({ channel: "lamp", rule: "curve", over: "height" });
  const { points } = latest.zones[0].heating[0] as { points: [number, number][] };
  expect([points[0], points[points.length - 1]]).toEqual([
    [0, 0.62],
    [6, 0.62],
  ]);
});

test("lead, bed layers and what becomes of the file's own commands are part of the draft", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  await user.click(screen.getByText("Limits and timing"));
  const table = within(screen.getByRole("table", { name: "Limits and timing" }));
  expect(table.getByText("1 s")).toBeTruthy();
  await user.selectOptions(table.getByRole("combobox", { name: "Ahead, lamp" }), "seconds");
  await user.clear(table.getByRole("textbox", { name: "Ahead by s, lamp" }));
  await user.type(table.getByRole("textbox", { name: "Ahead by s, lamp" }), "1.5");
  await user.clear(table.getByRole("textbox", { name: "Bed layers 0–1, lamp" }));
  await user.selectOptions(screen.getByRole("combobox", { name: "Fan commands inside a layer" }), "keep-raises");
  expect(latest).toMatchObject({ lead: { lamp: 1.5 }, bedLayers: { count: 2, duty: {} }, withinLayer: "keep-raises" });
});

test("a channel that the machine lacks is one thing to correct, however many zones name it", () => {
  const start = profileOf();
  for (const zone of start.zones) zone.heating = [{ channel: "halogen", rule: "fixed", duty: 0.5 }];
  render(<Editor start={{ ...start, bedLayers: { count: 0, duty: {} }, limits: {}, lead: {} }} />);
  expect(screen.getByText("1 thing to correct")).toBeTruthy();
  expect(screen.getByText(/^halogen: the machine .* has no channel "halogen"/)).toBeTruthy();
});

test("zones that begin above the part are listed, since they have no band", async () => {
  const start = profileOf();
  start.zones[0].to = 20;
  start.zones[1].from = 20;
  render(<Editor start={start} />);
  expect(screen.queryByRole("button", { name: /^Zone lip,/ })).toBeNull();
  await userEvent.click(screen.getByRole("button", { name: "lip, from 20 mm" }));
  expect(screen.getByRole("region", { name: "Zone lip" })).toBeTruthy();
});
