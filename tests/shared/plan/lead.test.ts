import { expect, test } from "vitest";
import { resolveLeadS } from "#shared/plan/lead.ts";
import { everywhere, fixed, machineWith, profileWith } from "#tests/shared/plan/documents.ts";

function lampLeadS(lamp: object, lead: object) {
  const profile = profileWith(everywhere([], fixed("lamp", 0.5)), { lead });
  return resolveLeadS(machineWith({ lamp }).channels[1], profile);
}

test("a channel that the profile gives no lead has none", () => {
  expect(lampLeadS({ settleS: 2 }, {})).toBe(0);
});

test("a lead in seconds is taken as it is", () => {
  expect(lampLeadS({ settleS: 2 }, { lamp: 3.5 })).toBe(3.5);
});

test('"settle" leads by half the time the channel takes to settle', () => {
  expect(lampLeadS({ settleS: 2 }, { lamp: "settle" })).toBe(1);
  expect(lampLeadS({}, { lamp: "settle" })).toBe(0);
});

test("an output that acts as soon as its line is read leads by its buffer time less, but never after its layer begins", () => {
  expect(lampLeadS({ acts: { immediate: 0.5 } }, { lamp: 2 })).toBe(1.5);
  expect(lampLeadS({ acts: { immediate: 3 } }, { lamp: 2 })).toBe(0);
});
