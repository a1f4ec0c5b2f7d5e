import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { contentOf } from "#shared/formats/document.ts";
import { parseJson } from "#shared/formats/parse-json.ts";
import { parseProfile, writeProfile } from "#shared/formats/profile.ts";
import { banded, fixedLamp, type Json, problemsOf, refusal, sealRing } from "#tests/shared/formats/documents.ts";

/** Problems of the example profile after it was spoilt. */
function problems(spoil: (profile: Json) => void): string[] {
  const profile = sealRing();
  spoil(profile);
  return problemsOf(() => parseProfile(profile));
}

describe("one rule or a list of rules", () => {
  test("is always a list inside", () => {
    const profile = sealRing();
    profile.zones[1].heating = [profile.zones[1].heating];
    const { zones } = parseProfile(profile);
    expect(zones.map(({ cooling, heating }) => [cooling.length, heating.length])).toEqual([
      [1, 1],
      [1, 1],
    ]);
  });

  test("may be left out", () => {
    expect(parseProfile(banded("mm", [0])).zones[0].cooling).toEqual([]);
  });

  test("is named in messages as it was written", () => {
    const [single] = problems((profile) => {
      profile.zones[1].cooling.points[0][1] = 1.4;
    });
    expect(single).toBe(
      "zones[1].cooling.points[0][1]: must be between 0 and 1, got 1.4. Give the duty as a fraction of full power, such as 0.62 for 62 %.",
    );
    const [listed] = problems((profile) => {
      profile.zones[1].cooling = [{ ...profile.zones[1].cooling, points: [[1, 2]] }];
    });
    expect(listed).toMatch(/^zones\[1\]\.cooling\[0\]\.points\[0\]\[1\]: /);
  });
});

test("defaults are filled in where optional fields are left out", () => {
  expect(parseProfile(banded("mm", [0]))).toEqual({
    format: "quenchline.profile/1",
    name: "Bands",
    polymer: "PPS",
    bedLayers: { count: 0, duty: {} },
    zones: [{ name: "a", from: 0, unit: "mm", target: "none", rampMm: 0, cooling: [], heating: [fixedLamp] }],
    limits: {},
    lead: {},
    withinLayer: "replace",
  });
});

test("defaults are not shared between documents", () => {
  parseProfile(banded("mm", [0])).limits.lamp = { maxDuty: 0.1 };
  parseProfile(banded("mm", [0])).bedLayers.duty.lamp = 1;
  parseProfile(banded("mm", [0])).zones[0].cooling.push({ channel: "lamp", rule: "hold" });
  expect(parseProfile(banded("mm", [0]))).toMatchObject({
    limits: {},
    bedLayers: { duty: {} },
    zones: [{ cooling: [] }],
  });
});

describe("round trip", () => {
  test("the example is read back as it was written", () => {
    const profile = parseProfile(sealRing());
    expect(parseProfile(parseJson(writeProfile(profile), "profile"))).toEqual(profile);
  });

  test("a version is kept, and is no part of what the profile says", () => {
    const profile = parseProfile({ ...sealRing(), version: 3 });
    expect(parseProfile(parseJson(writeProfile(profile), "profile"))).toEqual(profile);
    expect(writeProfile(contentOf(profile))).toBe(writeProfile(parseProfile(sealRing())));
  });

  test("a curve point stands on one line, and names are left alone", () => {
    const text = writeProfile(parseProfile({ ...sealRing(), name: "[ 1, 2 ] [\t3,4]".replace("\t", " ") }));
    expect(text).toContain("            [3, 0.55],\n");
    expect(text).toContain('"name": "[ 1, 2 ] [ 3,4]"');
  });

  test("the order in which channels were given does not show in the text", () => {
    const turned = sealRing();
    turned.lead = { lamp: "settle", "part-fan": 0 };
    expect(writeProfile(parseProfile(turned))).toBe(writeProfile(parseProfile(sealRing())));
  });

  test("whatever zones and curves a profile has, it is read back as it was written", () => {
    fc.assert(
      fc.property(anyProfile, (json) => {
        const profile = parseProfile(json);
        expect(parseProfile(parseJson(writeProfile(profile), "profile"))).toEqual(profile);
      }),
    );
  });
});

const duty = fc.double({ min: 0, max: 1, noNaN: true });
const channelId = fc.stringMatching(/^[a-z][a-z0-9]{0,5}(-[a-z0-9]{1,5}){0,2}$/).filter((id) => id !== "constructor");
const label = fc.string({ unit: "grapheme", minLength: 1, maxLength: 20 }).filter((text) => text.trim() !== "");
const points = fc
  .uniqueArray(fc.tuple(fc.double({ min: 0, max: 1e6, noNaN: true }), duty), {
    minLength: 1,
    selector: ([x]) => x + 0,
  })
  .map((list) => list.sort(([a], [b]) => a - b));
const rule = fc.oneof(
  fc.record({ channel: channelId, rule: fc.constant("fixed"), duty }),
  fc.record({
    channel: channelId,
    rule: fc.constant("curve"),
    over: fc.constantFrom("layer-time", "deposited-length", "height"),
    points,
  }),
  fc.record({ channel: channelId, rule: fc.constant("hold"), baseDuty: duty }, { requiredKeys: ["channel", "rule"] }),
);
const rules = fc.uniqueArray(rule, { maxLength: 4, selector: ({ channel }) => channel });
/** What a zone is to reach; where no rule holds, nothing has to be said. */
const wish = fc.oneof(
  fc.record({ target: fc.constantFrom("amorphous", "semi-crystalline") }),
  fc.record({
    target: fc.constant("none"),
    pattern: fc.oneof(
      fc.record(
        {
          kind: fc.constant("alternating"),
          amorphousLayers: fc.integer({ min: 1, max: 9 }),
          semiCrystallineLayers: fc.integer({ min: 1, max: 9 }),
          first: fc.constantFrom("amorphous", "semi-crystalline"),
        },
        { requiredKeys: ["kind", "amorphousLayers", "semiCrystallineLayers"] },
      ),
      fc.constant({ kind: "graded", from: "amorphous", to: "semi-crystalline" }),
    ),
  }),
);
const anyProfile = fc
  .record({
    name: label,
    polymer: label,
    heights: fc.array(fc.integer({ min: 1, max: 50_000 }), { minLength: 1, maxLength: 5 }),
    rules,
    wish,
    limits: fc.dictionary(channelId, fc.record({ maxDuty: duty, maxDutyPerLayer: fc.constantFrom(0.1, 1) })),
    lead: fc.dictionary(channelId, fc.oneof(fc.constant("settle"), fc.double({ min: 0, max: 60, noNaN: true }))),
  })
  .map(({ heights, rules: heating, wish: wished, name, polymer, limits, lead }) => {
    const holds = heating.some(({ rule: kind }) => kind === "hold");
    let top = 0;
    const zones = heights.map((height) => {
      const from = top / 1000;
      top += height;
      return { name, from, to: top / 1000, unit: "mm", heating, ...(holds ? wished : { target: "none" }) };
    });
    return { format: "quenchline.profile/1", name, polymer, zones, limits, lead };
  });

describe("wrong values", () => {
  test.each<[string, (profile: Json) => void, string | RegExp]>([
    [
      "hold without a state to hold",
      (p) => Object.assign(p.zones[0], { target: "none", heating: { channel: "lamp", rule: "hold" } }),
      'zones[0].target: is "none", but a rule of this zone is "hold". Say which state is to be held, or use "fixed" or "curve".',
    ],
    [
      "a pattern beside a target",
      (p) =>
        Object.assign(p.zones[0], {
          heating: { channel: "lamp", rule: "hold" },
          pattern: { kind: "graded", from: "amorphous", to: "semi-crystalline" },
        }),
      'zones[0].target: is "semi-crystalline", but the zone has a pattern, which says the states. Give "none", or take the pattern out.',
    ],
    [
      "a pattern that no rule follows",
      (p) =>
        Object.assign(p.zones[0], {
          target: "none",
          pattern: { kind: "alternating", amorphousLayers: 2, semiCrystallineLayers: 3 },
        }),
      'zones[0].pattern: needs a rule that is solved from it. Use "hold" for heating, cooling or both.',
    ],
    [
      "a grade that leads nowhere",
      (p) =>
        Object.assign(p.zones[0], {
          target: "none",
          heating: { channel: "lamp", rule: "hold" },
          pattern: { kind: "graded", from: "amorphous", to: "amorphous" },
        }),
      'zones[0].pattern.to: is "amorphous" like from, so nothing changes. Give the other state, or use target.',
    ],
    [
      "a curve without points",
      (p) => (p.zones[0].cooling.points = []),
      "zones[0].cooling.points: has no point. Give at least one, as [x, duty].",
    ],
    [
      "curve points that stand still",
      (p) => (p.zones[0].cooling.points[1][0] = 3),
      /^zones\[0\]\.cooling\.points\[1\]\[0\]: must be greater than the x of the point before \(3\), got 3\./,
    ],
    [
      "a point of one number",
      (p) => (p.zones[0].cooling.points[1] = [10]),
      "zones[0].cooling.points[1]: must be a pair [x, duty].",
    ],
    [
      "a point that is no list",
      (p) => (p.zones[0].cooling.points[1] = 10),
      "zones[0].cooling.points[1]: must be a pair of numbers, got 10.",
    ],
    [
      "an unknown rule",
      (p) => (p.zones[0].heating.rule = "fix"),
      'zones[0].heating.rule: must be one of "fixed", "curve", "hold", got "fix". Did you mean "fixed"?',
    ],
    [
      "a rule without a channel",
      (p) => delete p.zones[0].heating.channel,
      "zones[0].heating.channel: is missing. Add it: a text.",
    ],
    [
      "a field of another rule",
      (p) => (p.zones[0].heating.points = []),
      "zones[0].heating.points: is not a known field. Remove it. The fields here are channel, rule, duty.",
    ],
    [
      "null for a rule",
      (p) => (p.zones[0].heating = null),
      "zones[0].heating: must be an object, got null. Leave an optional field out instead.",
    ],
    [
      "a lead that is no time",
      (p) => (p.lead.lamp = "soon"),
      'lead.lamp: must be a number of seconds from 0 to 3600, or "settle", got "soon".',
    ],
    ["a negative lead", (p) => (p.lead.lamp = -1), "lead.lamp: must be between 0 and 3600, got -1."],
    ["a key that is no channel id", (p) => (p.limits["Part Fan"] = {}), /^limits\["Part Fan"\]: is no channel id/],
    [
      "limits that cross",
      (p) => (p.limits.lamp = { minDuty: 0.5, maxDuty: 0.4 }),
      "limits.lamp.minDuty: is 0.5, above maxDuty 0.4. Lower minDuty or raise maxDuty.",
    ],
    [
      "margins that overlap",
      (p) => (p.margins = { maxCrystallinity: 0.3, minCrystallinity: 0.2 }),
      /^margins\.maxCrystallinity: is 0\.3, above minCrystallinity 0\.2/,
    ],
    [
      "a name with a line break",
      (p) => (p.zones[1].name = "lip\nM106 S255"),
      /^zones\[1\]\.name: contains a line break/,
    ],
    [
      "an unknown target",
      (p) => (p.zones[0].target = "crystalline"),
      /^zones\[0\]\.target: must be one of "amorphous", "semi-crystalline", "none"/,
    ],
  ])("%s: refused", (_, spoil, line) => {
    const [problem] = problems(spoil);
    if (typeof line === "string") expect(problem).toBe(line);
    else expect(problem).toMatch(line);
  });

  test("the refusal says that it is the profile", () => {
    expect(refusal(() => parseProfile({}))).toMatchObject({ code: "bad-profile", place: { path: "format" } });
  });
});
