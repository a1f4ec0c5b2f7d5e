import { describe, expect, test } from "vitest";
import { checkFit } from "#shared/formats/fit.ts";
import { parseMachine } from "#shared/formats/machine.ts";
import { parsePolymer } from "#shared/formats/polymer.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { card, type Json, problemsOf, refusal, sealRing, tern } from "#tests/shared/formats/documents.ts";

interface Documents {
  machine: Json;
  profile: Json;
  polymer: Json;
}

/** Checks the example documents after they were spoilt. */
function fitSpoilt(spoil: (documents: Documents) => void = () => {}): void {
  const documents = { machine: tern(), profile: sealRing(), polymer: card() };
  spoil(documents);
  checkFit(parseMachine(documents.machine), parseProfile(documents.profile), parsePolymer(documents.polymer));
}

test("the examples of the formats' description fit each other", () => {
  expect(() => fitSpoilt()).not.toThrow();
});

test("a polymer card is not needed", () => {
  expect(() => checkFit(parseMachine(tern()), parseProfile(sealRing()))).not.toThrow();
});

test("a polymer may be named with its variant, in any case and spacing", () => {
  const named = (name: string) => () => fitSpoilt(({ profile }) => Object.assign(profile, { polymer: name }));
  expect(named("peek")).not.toThrow();
  expect(named(" PEEK  Neat")).not.toThrow();
  expect(named("PEEK carbon")).toThrow();
});

test("a limit of 0 keeps a channel off, whatever its dead band", () => {
  expect(() => fitSpoilt(({ profile }) => Object.assign(profile.limits["part-fan"], { maxDuty: 0 }))).not.toThrow();
});

const both = (profile: Json, side: "cooling" | "heating", change: Json) => {
  for (const zone of profile.zones) Object.assign(zone[side], change);
};

describe("a profile does not fit", () => {
  test.each<[string, string, (documents: Documents) => void, string]>([
    [
      "when a rule names a channel that the machine lacks",
      "unknown-channel",
      ({ machine }) => Object.assign(machine.channels[0], { id: "fan" }),
      'zones[0].cooling.channel: the machine "Tern" has no channel "part-fan"; it has fan, lamp. Name one of them, or add the channel to the machine.',
    ],
    [
      "when a rule misspells a channel",
      "unknown-channel",
      ({ machine }) => Object.assign(machine.channels[0], { id: "part-fans" }),
      'zones[0].cooling.channel: the machine "Tern" has no channel "part-fan"; it has part-fans, lamp. Did you mean "part-fans"?',
    ],
    [
      "when the machine has no channels",
      "unknown-channel",
      ({ machine }) => Object.assign(machine, { channels: [] }),
      'zones[1].heating.channel: the machine "Tern" has no channel "lamp"; it has none. Name one of them, or add the channel to the machine.',
    ],
    [
      "when a fan is to heat",
      "wrong-kind",
      ({ profile }) =>
        both(profile, "heating", { channel: "part-fan" }) ?? both(profile, "cooling", { channel: "lamp" }),
      'zones[0].heating.channel: "part-fan" is a fan, but heating needs a heater. Move the rule to cooling, or name a heater.',
    ],
    [
      "when a heater is to cool",
      "wrong-kind",
      ({ profile }) =>
        both(profile, "heating", { channel: "part-fan" }) ?? both(profile, "cooling", { channel: "lamp" }),
      'zones[1].cooling.channel: "lamp" is a heater, but cooling needs a fan. Move the rule to heating, or name a fan.',
    ],
    [
      "when a zone leaves out a channel that another one drives",
      "channel-not-driven",
      ({ profile }) => delete profile.zones[1].heating,
      'zones[1]: zone "lip" has no rule for "lamp", which other zones drive, so its duty would be undefined here. Add a rule, for instance fixed.',
    ],
    [
      "when limits name a channel that no zone drives",
      "channel-not-driven",
      ({ profile }) => Object.assign(profile.limits, { lampe: {} }),
      'limits.lampe: no zone drives "lampe". Did you mean "lamp"?',
    ],
    [
      "when a lead names a channel that no zone drives",
      "channel-not-driven",
      ({ profile }) => Object.assign(profile.lead, { chamber: 1 }),
      'lead.chamber: no zone drives "chamber". Remove it, or add a rule to every zone.',
    ],
    [
      "when bed layers name a channel that no zone drives",
      "channel-not-driven",
      ({ profile }) => Object.assign(profile.bedLayers.duty, { chamber: 1 }),
      'bedLayers.duty.chamber: no zone drives "chamber". Remove it, or add a rule to every zone.',
    ],
    [
      "when its maximum is above the machine's",
      "limits-too-wide",
      ({ profile }) => Object.assign(profile.limits.lamp, { maxDuty: 0.9 }),
      "limits.lamp.maxDuty: is 0.9, above the machine's 0.85. A profile's limits can only narrow the machine's: give at most 0.85, or leave it out.",
    ],
    [
      "when its minimum is below the machine's",
      "limits-too-wide",
      ({ profile }) => Object.assign(profile.limits["part-fan"], { minDuty: 0.1 }),
      "limits.part-fan.minDuty: is 0.1, below the machine's 0.12. A profile's limits can only narrow the machine's: give at least 0.12, or leave it out.",
    ],
    [
      "when it changes faster than the machine allows",
      "limits-too-wide",
      ({ profile }) => Object.assign(profile.limits.lamp, { maxDutyPerS: 0.1 }),
      "limits.lamp.maxDutyPerS: is 0.1, above the machine's 0.05. A profile's limits can only narrow the machine's: give at most 0.05, or leave it out.",
    ],
    [
      "when its minimum is above the machine's maximum",
      "limits-too-wide",
      ({ profile }) => Object.assign(profile.limits.lamp, { minDuty: 0.9 }),
      "limits.lamp.minDuty: is 0.9, above the machine's maxDuty 0.85, so no duty is left. Lower it.",
    ],
    [
      "when its maximum is inside the machine's dead band",
      "limits-too-wide",
      ({ profile }) => Object.assign(profile.limits["part-fan"], { maxDuty: 0.1 }),
      "limits.part-fan.maxDuty: is 0.1, below the machine's minDuty 0.12, so no duty but 0 is left. Raise it, or give 0 to keep the channel off.",
    ],
    [
      "when a fan is to step down at the end",
      "wrong-kind",
      ({ profile }) => Object.assign(profile.limits["part-fan"], { endRampMm: 2 }),
      'limits.part-fan.endRampMm: is for heaters, and "part-fan" is a fan. Leave it out.',
    ],
    [
      "when the card is for another polymer",
      "polymer-mismatch",
      ({ polymer }) => Object.assign(polymer, { name: "PPS", variant: "" }),
      'polymer: is "PEEK", but the polymer card is for "PPS". Choose the card the profile was written for, or another profile.',
    ],
    [
      "when amorphous is out of the polymer's reach",
      "amorphous-out-of-reach",
      ({ polymer }) => Object.assign(polymer, { amorphousReachable: false }),
      'zones[1].target: "amorphous" is out of reach for PEEK neat, which crystallises too fast. Use "semi-crystalline" or "none".',
    ],
  ])("%s", (_, code, spoil, line) => {
    expect(problemsOf(() => fitSpoilt(spoil))).toContain(line);
    expect(refusal(() => fitSpoilt(spoil)).code).toBe(code);
  });
});

test("problems of several kinds are reported together, with the first one's path as the place", () => {
  const call = () =>
    fitSpoilt(({ profile, polymer }) => {
      profile.zones[0].cooling = [profile.zones[0].cooling, { channel: "aux", rule: "hold" }];
      polymer.amorphousReachable = false;
    });
  expect(refusal(call)).toMatchObject({ code: "profile-does-not-fit", place: { path: "zones[0].cooling[1].channel" } });
  expect(problemsOf(call).map((line) => line.split(":")[0])).toEqual([
    "zones[0].cooling[1].channel",
    "zones[1]",
    "zones[1].target",
  ]);
});
