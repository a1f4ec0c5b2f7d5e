import { describe, expect, test } from "vitest";
import { parsePolymer, writePolymer } from "#shared/formats/polymer.ts";
import { card, type Json, problemsOf } from "#tests/shared/formats/documents.ts";

function problems(spoil: (polymer: Json) => void): string[] {
  const polymer = card();
  spoil(polymer);
  return problemsOf(() => parsePolymer(polymer));
}

test("a card is read back as it was written", () => {
  const polymer = parsePolymer(card());
  expect(polymer.tgC).toEqual({ value: 143, source: "invented for tests", confidence: "unverified" });
  expect(parsePolymer(JSON.parse(writePolymer(polymer)))).toEqual(polymer);
});

test("without a variant it is the neat polymer", () => {
  const { variant, ...neat } = card();
  expect(parsePolymer(neat).variant).toBe("");
});

describe("a card is refused", () => {
  test.each<[string, (polymer: Json) => void, string]>([
    ["for a bare number", (p) => (p.tgC = 143), "tgC: must be an object, got 143."],
    ["for a number without source", (p) => delete p.tgC.source, "tgC.source: is missing. Add it: a text."],
    [
      "for an empty source",
      (p) => (p.tgC.source = " "),
      "tgC.source: is empty or longer than 1000 characters. Say where the number comes from.",
    ],
    [
      "for an unknown confidence",
      (p) => (p.tgC.confidence = "handbok"),
      'tgC.confidence: must be one of "published", "handbook", "unverified", "own measurement", got "handbok". Did you mean "handbook"?',
    ],
    ["for kelvin", (p) => (p.tmC.value = 616), "tmC.value: must be between -100 and 600, got 616."],
    [
      "for a share in per cent",
      (p) => (p.emissivity.value = 90),
      "emissivity.value: must be between 0 and 1, got 90. Give it as a fraction, such as 0.35 for 35 %.",
    ],
    [
      "when it melts below Tg",
      (p) => (p.tmC.value = 100),
      "tgC.value: is 143, not below tmC 100. Correct one of the two.",
    ],
    [
      "when it is solid above its melting temperature",
      (p) => (p.solidBelowC.value = 350),
      "solidBelowC.value: is 350, above tmC 343. Correct one of the two.",
    ],
    [
      "when absorptivities are out of order",
      (p) => (p.lampAbsorptivity.low.value = 0.8),
      "lampAbsorptivity.low.value: is 0.8, above lampAbsorptivity.typical 0.7. Correct one of the two.",
    ],
    [
      "when a layer could count as both states",
      (p) => (p.margins.maxCrystallinity.value = 0.25),
      "margins.maxCrystallinity.value: is 0.25, above margins.minCrystallinity 0.2. Correct one of the two.",
    ],
    [
      "when its minimum can never be reached",
      (p) => (p.margins.minCrystallinity.value = 0.4),
      "margins.minCrystallinity.value: is 0.4, above crystallinity.attainable 0.35. Correct one of the two.",
    ],
    [
      "when it crystallises fastest as a melt",
      (p) => (p.crystallinity.fastestAtC.value = 343),
      "crystallinity.fastestAtC.value: is 343, not below tmC 343. Correct one of the two.",
    ],
    [
      "when it crystallises fastest as a glass",
      (p) => (p.crystallinity.fastestAtC.value = 140),
      "tgC.value: is 143, not below crystallinity.fastestAtC 140. Correct one of the two.",
    ],
    [
      "for a variant with a line break",
      (p) => (p.variant = "a\nb"),
      "variant: contains a line break or another control character. Type it again as plain text.",
    ],
  ])("%s", (_, spoil, line) => {
    expect(problems(spoil)).toContain(line);
  });
});
