import { fireEvent, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { expect, test } from "vitest";
import { Profile } from "#shared/formats/profile.ts";
import { ProfileEditor } from "#src/features/profiles/editor/profile-editor.tsx";
import { asRule } from "#src/features/profiles/editor/rule-editor.tsx";
import { withWanted } from "#src/features/profiles/editor/zone-target.tsx";
import { cardOf } from "#tests/src/features/prediction/predictions.ts";
import { machineOf, PART, profileOf } from "#tests/src/profile-editor/profiles.ts";

let latest: Profile;

function Editor() {
  const [profile, setProfile] = useState(profileOf());
  latest = profile;
  return (
    <ProfileEditor profile={profile} onChange={setProfile} machine={machineOf()} polymer={cardOf("peek")} part={PART} />
  );
}

const rule = (channel: string) => screen.getByRole("group", { name: `${channel} in zone base` });

test("a heater can hold the target, from a base duty or from none", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  fireEvent.click(screen.getByRole("button", { name: /^Zone base,/ }));
  await user.selectOptions(within(rule("lamp")).getByRole("combobox", { name: "Rule" }), "hold");
  expect(latest.zones[0].heating).toEqual([{ channel: "lamp", rule: "hold", baseDuty: 0.62 }]);
  expect(within(rule("lamp")).getByText(/solved from the zone's target/)).toBeTruthy();
  await user.clear(within(rule("lamp")).getByRole("textbox", { name: "Base duty 0–1" }));
  expect(latest.zones[0].heating).toEqual([{ channel: "lamp", rule: "hold" }]);
  expect(Profile.safeParse(latest).success).toBe(true);
});

test("to hold without a target is a problem at the target", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  fireEvent.click(screen.getByRole("button", { name: /^Zone base,/ }));
  await user.selectOptions(within(rule("lamp")).getByRole("combobox", { name: "Rule" }), "hold");
  await user.selectOptions(screen.getByRole("combobox", { name: "Target" }), "none");
  expect(screen.getByText(/^Target is "none", but a rule of this zone is "hold"/)).toBeTruthy();
});

test("both states by turns: the zone's target gives way to a pattern, and back", async () => {
  const user = userEvent.setup();
  render(<Editor />);
  fireEvent.click(screen.getByRole("button", { name: /^Zone base,/ }));
  await user.selectOptions(within(rule("lamp")).getByRole("combobox", { name: "Rule" }), "hold");
  await user.selectOptions(screen.getByRole("combobox", { name: "Target" }), "alternating");
  const layers = screen.getByRole("textbox", { name: "Amorphous layers" });
  await user.clear(layers);
  await user.type(layers, "3");
  expect(latest.zones[0]).toMatchObject({ target: "none", pattern: { kind: "alternating", amorphousLayers: 3 } });
  expect(Profile.safeParse(latest).success).toBe(true);
  expect(withWanted(latest.zones[0], "amorphous")).not.toHaveProperty("pattern");
});

test("margins of its own stand beside the card's", () => {
  render(<Editor />);
  fireEvent.click(screen.getByText("Margins of its own"));
  expect(screen.getByText("card: 0.08")).toBeTruthy();
});

test("a rule that held goes on from its base duty", () => {
  expect(asRule({ channel: "lamp", rule: "hold", baseDuty: 0.3 }, "fixed")).toEqual({
    channel: "lamp",
    rule: "fixed",
    duty: 0.3,
  });
  expect(asRule({ channel: "lamp", rule: "fixed", duty: 0 }, "hold")).toEqual({ channel: "lamp", rule: "hold" });
});
