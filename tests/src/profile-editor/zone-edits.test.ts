import fc from "fast-check";
import { expect, test } from "vitest";
import { Profile } from "#shared/formats/profile.ts";
import { borderScale } from "#src/features/profiles/editor/band-axis.ts";
import {
  addZone,
  drivingChannel,
  inUnit,
  movedBorder,
  removeZone,
  splitZone,
  withBorder,
} from "#src/features/profiles/editor/zone-edits.ts";
import { PART, profileOf } from "#tests/src/profile-editor/profiles.ts";

const scale = borderScale("mm", PART, 6);
const borders = ({ zones }: Profile) => zones.map(({ from, to }) => [from, to]);

test("a border is the upper end of one zone and the lower end of the next: both move", () => {
  expect(borders(movedBorder(profileOf(), 0, 4.2, scale))).toEqual([
    [0, 4.2],
    [4.2, undefined],
  ]);
});

test("a dragged border lands on the top of a layer", () => {
  expect(scale.borderAt(4.29)).toBe(4.2);
  expect(scale.borderAt(4.31)).toBe(4.4);
  expect(scale.stepped(6, 1)).toBe(6.2);
  expect(scale.stepped(6, -10)).toBe(4);
});

test("a border can't be dragged past its neighbours or beyond the part", () => {
  const three = splitZone(profileOf(), 1, 8, scale);
  expect(movedBorder(three, 0, 99, scale).zones[0].to).toBe(7.8);
  expect(movedBorder(three, 1, 0, scale).zones[1].to).toBe(6.2);
  expect(movedBorder(three, 1, 99, scale).zones[1].to).toBe(9);
});

test("what is typed for a border stands even where it can't be, so that it can be corrected", () => {
  const typed = withBorder(profileOf(), 0, 0);
  expect(typed.zones[1].from).toBe(0);
  expect(Profile.safeParse(typed).success).toBe(false);
});

test("a split zone keeps its rules in both parts; the upper one gets a name of its own and no ramp", () => {
  const split = splitZone(profileOf(), 1, 7.5, scale);
  expect(split.zones.map(({ name, rampMm }) => [name, rampMm])).toEqual([
    ["base", 0],
    ["lip", 0.6],
    ["lip 2", 0],
  ]);
  expect(split.zones[2].heating).toEqual(split.zones[1].heating);
  expect(splitZone(split, 1, 6.6, scale).zones.map(({ name }) => name)).toEqual(["base", "lip", "lip 3", "lip 2"]);
});

test("a zone of one layer can't be split", () => {
  const thin = profileOf({
    zones: [
      { ...profileOf().zones[0], to: 0.2 },
      { ...profileOf().zones[1], from: 0.2 },
    ],
  });
  expect(splitZone(thin, 0, 0.1, scale)).toBe(thin);
});

test("a removed zone leaves no gap", () => {
  const three = splitZone(profileOf(), 1, 8, scale);
  expect(borders(removeZone(three, 1))).toEqual([
    [0, 8],
    [8, undefined],
  ]);
  expect(borders(removeZone(three, 0))).toEqual([
    [0, 8],
    [8, undefined],
  ]);
  expect(borders(removeZone(three, 2))).toEqual([
    [0, 6],
    [6, undefined],
  ]);
});

test("the last zone can't be removed", () => {
  const one = removeZone(profileOf(), 1);
  expect(removeZone(one, 0)).toBe(one);
});

test("a zone added on top shares the last one's room, or goes on where that one ends", () => {
  expect(borders(addZone(profileOf(), scale))).toEqual([
    [0, 6],
    [6, 7.4],
    [7.4, undefined],
  ]);
  const ended = profileOf({ zones: [profileOf().zones[0], { ...profileOf().zones[1], to: 8 }] });
  expect(borders(addZone(ended, scale))).toEqual([
    [0, 6],
    [6, 8],
    [8, undefined],
  ]);
});

test("another unit leaves every border on the same layer, there and back", () => {
  const layer = borderScale("layer", PART, 0);
  const fraction = borderScale("fraction", PART, 0);
  const inLayers = inUnit(profileOf(), "layer", scale, layer);
  expect(borders(inLayers)).toEqual([
    [0, 30],
    [30, undefined],
  ]);
  expect(borders(inUnit(inLayers, "fraction", layer, fraction))[0]).toEqual([0, 0.6667]);
  expect(borders(inUnit(inUnit(inLayers, "fraction", layer, fraction), "mm", fraction, scale))).toEqual(
    borders(profileOf()),
  );
});

test("without a part the axis is in the profile's own unit", () => {
  expect(borderScale("fraction", undefined, 0.4)).toMatchObject({ topMm: 1 });
  expect(borderScale("mm", undefined, 18).borderAt(17.449)).toBe(17.4);
  expect(borderScale("layer", undefined, 30).stepped(30, -1)).toBe(29);
});

test("whatever is dragged, split, added and removed, the profile stays a usable one", () => {
  const step = fc.record({
    act: fc.constantFrom("move", "split", "remove", "add"),
    zone: fc.nat(6),
    height: fc.double({ min: -3, max: 14, noNaN: true }),
  });
  fc.assert(
    fc.property(fc.array(step, { maxLength: 25 }), (steps) => {
      let profile = profileOf();
      for (const { act, zone, height } of steps) {
        const z = zone % profile.zones.length;
        if (act === "move" && z < profile.zones.length - 1)
          profile = movedBorder(profile, z, scale.borderAt(height), scale);
        if (act === "split") profile = splitZone(profile, z, scale.borderAt(height), scale);
        if (act === "remove") profile = removeZone(profile, z);
        if (act === "add" && profile.zones.length < 20) profile = addZone(profile, scale);
      }
      const checked = Profile.safeParse(profile);
      expect(checked.error?.issues ?? []).toEqual([]);
    }),
  );
});

test("a channel is driven in every zone or in none, and goes with all that is said of it", () => {
  const without = drivingChannel(profileOf(), "heating", "lamp", false);
  expect(without.zones.flatMap(({ heating }) => heating)).toEqual([]);
  expect([without.limits, without.lead, without.bedLayers.duty]).toEqual([{}, {}, {}]);
  const again = drivingChannel(without, "heating", "lamp", true);
  expect(again.zones.map(({ heating }) => heating)).toEqual([
    [{ channel: "lamp", rule: "fixed", duty: 0 }],
    [{ channel: "lamp", rule: "fixed", duty: 0 }],
  ]);
});
