import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { Machine } from "#shared/formats/machine.ts";
import { Polymer } from "#shared/formats/polymer.ts";
import { Profile } from "#shared/formats/profile.ts";
import { differences } from "#src/features/documents/differences.ts";
import { grouped, placeOf, placeText, placeUnit, placeWords } from "#src/lib/place.ts";

const sample = (name: string): unknown =>
  JSON.parse(readFileSync(join(import.meta.dirname, "../../../samples", name), "utf8"));

const PROFILE = {
  zones: [
    { name: "base", heating: [{ channel: "lamp", duty: 2 }] },
    { name: "lip", heating: { channel: "lamp", duty: 2 } },
  ],
};

test.each([
  ["zones[0].heating[0].duty", "Zone base, heating lamp, duty"],
  ["zones[1].heating.duty", "Zone lip, heating, duty"],
  ["zones[1].to", "Zone lip, up to"],
  ["zones[7].to", "Zone 8, up to"],
  ["zones[0].heating[0].points[2][1]", "Zone base, heating lamp, point 3 of the curve"],
  ["limits.lamp.maxDuty", "Limits of lamp, most duty"],
  ["lead.part-fan", "Ahead, part-fan"],
  ["margins.belowTgC", "Margins, amorphous: below Tg by"],
  ["motion.accelMmS2.print", "Motion, acceleration, printing"],
  ["motion.axes.e.maxSpeedMmS", "Motion, E, top speed"],
  ["thermal.convection.fans.part-fan.h1WM2K.low", "Surroundings, fan part-fan, convection added at full duty, low"],
  ["tgC.source", "Glass transition, Tg, source"],
  ["", "The document"],
  ["fromAnotherTime", "fromAnotherTime"],
])("%s is %s", (path, words) => {
  expect(placeText(placeOf(path, PROFILE))).toBe(words);
});

test("an entry is numbered from 1 where no document names it", () => {
  expect(placeText(placeOf("channels[0].minDuty"))).toBe("Channel 1, least duty");
});

test("a unit goes with the number at the place", () => {
  expect(placeUnit(placeOf("motion.maxSpeedMmS"))).toBe("mm/s");
  expect(placeUnit(placeOf("tgC.value"))).toBe("°C");
  expect(placeUnit(placeOf("name"))).toBeUndefined();
});

test("a place in a part of the document stands under that part", () => {
  expect(grouped(placeOf("zones[0].heating[0].duty", PROFILE))).toEqual({
    group: "Zone base",
    words: "Heating lamp, duty",
  });
  expect(grouped(placeOf("withinLayer"))).toEqual({ words: "Fan commands inside a layer" });
});

describe("every place of a document has words", () => {
  test.each([
    ["machine", Machine.parse(sample("machines/tern.json")), "format"],
    ["polymer", Polymer.parse(sample("polymers/peek.json")), "format"],
    ["profile", Profile.parse(sample("profiles/seal-ring-stiff-base-and-tough-lip.json")), "format"],
  ])("%s", (_, document, except) => {
    const places = differences({}, document).map(({ place }) => place);
    expect(places.length).toBeGreaterThan(10);
    const wordless = places.filter((place) => placeWords(place).length === 0).map((place) => JSON.stringify(place));
    expect(wordless).toEqual([JSON.stringify([{ field: except }])]);
  });
});
