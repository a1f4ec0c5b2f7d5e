import { expect, test } from "vitest";
import { lackingChannels, type ProfileGist } from "#shared/contract/gists.ts";

const profile: ProfileGist = {
  polymer: "PEEK",
  zones: [],
  drives: [
    { id: "part-fan", kind: "fan" },
    { id: "lamp", kind: "heater" },
  ],
};
const machine = (...channels: ProfileGist["drives"]) => ({ channels });

test("a machine that has every driven channel lacks none, whatever else it has", () => {
  expect(lackingChannels(profile, machine(...profile.drives, { id: "chamber", kind: "heater" }))).toEqual([]);
});

test("a channel of the same name but the other kind is lacking", () => {
  const swapped = machine({ id: "part-fan", kind: "heater" }, { id: "lamp", kind: "heater" });
  expect(lackingChannels(profile, swapped)).toEqual([{ id: "part-fan", kind: "fan" }]);
});
