import { describe, expect, test } from "vitest";
import { parseProfile } from "#shared/formats/profile.ts";
import { type Border, banded, type Json, problemsOf, sealRing } from "#tests/shared/formats/documents.ts";

/** Problems of the example profile after it was spoilt. */
function problems(spoil: (profile: Json) => void): string[] {
  const profile = sealRing();
  spoil(profile);
  return problemsOf(() => parseProfile(profile));
}

describe("zones", () => {
  test.each<[string, string, Border[]]>([
    ["one zone for all heights", "mm", [[0]]],
    [
      "borders that meet",
      "mm",
      [
        [0, 6],
        [6, 12.5],
        [12.5, 40],
      ],
    ],
    ["borders equal in whole micrometres", "mm", [[0, 0.1 + 0.2], [0.3]]],
    ["layers from 0", "layer", [[0, 10], [10]]],
    ["layers from 1", "layer", [[1, 10], [10]]],
    [
      "fractions to 1",
      "fraction",
      [
        [0, 0.5],
        [0.5, 1],
      ],
    ],
    ["fractions to the top", "fraction", [[0, 1 / 3], [0.333333]]],
  ])("may have %s", (_, unit, borders) => {
    expect(parseProfile(banded(unit, ...borders)).zones).toHaveLength(borders.length);
  });

  test.each<[string, string, Border[], string]>([
    [
      "a gap",
      "mm",
      [[0, 6], [7]],
      'zones[1].from: is 7, so between zones "a" and "b" there is a gap from 6 to 7. Start "b" at 6.',
    ],
    ["an overlap", "mm", [[0, 6], [5]], 'zones[1].from: is 5, so zones "a" and "b" overlap up to 6. Start "b" at 6.'],
    [
      "nothing at the bottom",
      "mm",
      [[0.2]],
      'zones[0].from: is 0.2, so nothing is said below zone "a". Start the first zone at 0.',
    ],
    [
      "no first layer",
      "layer",
      [[2]],
      'zones[0].from: is 2, so nothing is said below zone "a". Start the first zone at 0 or 1.',
    ],
    [
      "layers that skip one number",
      "layer",
      [[1, 10], [11]],
      'zones[1].from: is 11, so between zones "a" and "b" there is a gap from 10 to 11. Start "b" at 10. A zone covers (from, to], so from 10 begins with layer 11.',
    ],
    [
      "half a layer",
      "layer",
      [[0, 2.5], [2.5]],
      "zones[0].to: must be a whole layer number, got 2.5. Round it, or give the zone in mm.",
    ],
    [
      "a fraction above 1",
      "fraction",
      [[0, 50]],
      'zones[0].to: must be at most 1 with unit "fraction", got 50. Give 0-1, or use unit "mm" or "layer".',
    ],
    [
      "fractions that end early",
      "fraction",
      [[0, 0.9]],
      'zones[0].to: is 0.9, so nothing is said above zone "a". Give 1 or leave it out.',
    ],
    [
      "no end before the last",
      "mm",
      [[0], [6]],
      'zones[0].to: is missing, but zone "b" follows. Only the last zone may leave it out.',
    ],
    [
      "an order from the top down",
      "mm",
      [
        [6, 12],
        [0, 6],
      ],
      'zones[1].from: is 0, below the zone before it (zones "a" and "b"). List the zones from the bottom up.',
    ],
    [
      "no height",
      "mm",
      [
        [0, 6],
        [6, 6],
      ],
      "zones[1].to: is 6, not above from 6. A zone covers (from, to]: give a to above its from.",
    ],
    [
      "less than a micrometre of height",
      "mm",
      [[0, 0.0001]],
      "zones[0].to: is 0.0001, not above from 0. A zone covers (from, to]: give a to above its from.",
    ],
  ])("cannot have %s", (_, unit, borders, line) => {
    expect(problemsOf(() => parseProfile(banded(unit, ...borders)))).toContain(line);
  });

  test("share one unit", () => {
    expect(problems((profile) => Object.assign(profile.zones[1], { unit: "layer" }))).toEqual([
      'zones[1].unit: is "layer", but zones[0] uses "mm". Use one unit for all zones of a profile.',
    ]);
  });

  test("are at least one", () => {
    expect(problems((profile) => Object.assign(profile, { zones: [] }))[0]).toMatch(/^zones: has no zone/);
  });

  test("give a channel one rule only, cooling and heating together", () => {
    const [problem] = problems((profile) => {
      profile.zones[0].heating = { channel: "part-fan", rule: "fixed", duty: 0.1 };
    });
    expect(problem).toMatch(/^zones\[0\]\.heating\.channel: "part-fan" has a rule in this zone already, at cooling\./);
  });
});
