import { expect, test } from "vitest";
import { fitProblems } from "#shared/formats/fit.ts";
import { Profile } from "#shared/formats/profile.ts";
import { findProblems } from "#src/lib/document-problems.ts";
import { machineOf, profileOf } from "#tests/src/profile-editor/profiles.ts";

const fits = (profile: Profile) => fitProblems(machineOf(), profile);

test("a usable profile has no problem and comes back checked", () => {
  const { problems, document } = findProblems(Profile, profileOf(), fits);
  expect(problems.all).toEqual([]);
  expect(document).toEqual(profileOf());
});

test("what the schema finds is named by place", () => {
  const draft = profileOf();
  draft.zones[0].heating = [{ channel: "lamp", rule: "fixed", duty: 62 }];
  const { problems, document } = findProblems(Profile, draft);
  expect(document).toBeUndefined();
  expect(problems.at("zones[0].heating[0].duty")).toMatch(/between 0 and 1, got 62/);
  expect(problems.at("zones[0].heating.duty")).toBe(problems.at("zones[0].heating[0].duty"));
  expect(problems.within("zones[0]")).toHaveLength(1);
  expect(problems.within("zones[1]")).toEqual([]);
});

test("what does not fit the machine is named by place too, line by line", () => {
  const draft = profileOf({ limits: { lamp: { maxDuty: 0.95 }, "part-fan": { endRampMm: 2 } } });
  const { problems } = findProblems(Profile, draft, fits);
  expect(problems.at("limits.lamp.maxDuty")).toMatch(/above the machine's 0.85/);
  expect(problems.at("limits.part-fan.endRampMm")).toMatch(/is for heaters/);
});

test("zone 1 is not taken for zone 10", () => {
  const zones = Array.from({ length: 12 }, (_, z) => ({
    ...profileOf().zones[0],
    from: z,
    to: z + 1,
    target: z === 10 ? "odd" : "none",
  }));
  const { problems } = findProblems(Profile, { ...profileOf(), zones });
  expect(problems.within("zones[1]")).toEqual([]);
  expect(problems.within("zones[10]")).toHaveLength(1);
});

test("every misfit is named, however many there are", () => {
  const zones = Array.from({ length: 40 }, (_, z) => ({
    ...profileOf().zones[0],
    from: z,
    to: z < 39 ? z + 1 : undefined,
    cooling: [{ channel: "nothing", rule: "fixed" as const, duty: 0.5 }],
  }));
  const { problems } = findProblems(Profile, { ...profileOf(), zones }, fits);
  expect(problems.all.filter(({ path }) => path.endsWith("cooling.channel"))).toHaveLength(40);
});
