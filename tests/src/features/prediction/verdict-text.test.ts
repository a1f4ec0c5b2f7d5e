import { expect, test } from "vitest";
import { verdictsOf } from "#src/features/prediction/verdict-text.ts";
import { predictedLayer } from "#tests/src/features/prediction/predictions.ts";

const margins = { belowTgC: 15, aboveTgC: 15, maxCrystallinity: 0.08, minCrystallinity: 0.2 };
const amorphous = { state: "amorphous" as const, share: 0 };

test("a layer on which nothing is wrong needs no help", () => {
  const verdicts = verdictsOf({ layer: predictedLayer(1), target: amorphous, margins, crystallises: true });
  expect(verdicts.map(({ outcome }) => outcome)).toEqual(["plain", "good", "good", "good"]);
  expect(verdicts.some(({ help }) => help !== undefined)).toBe(false);
  expect(verdicts[0].text).toBe("Amorphous: crystallinity 0.010, at most 0.08 counts as amorphous.");
});

test("what is missed says what would help, and in the right direction", () => {
  const bad = predictedLayer(1, {
    crystallinity: 0.3,
    timeToSolidS: null,
    verdicts: { state: "semi-crystalline", reaches: "no", solid: false, welds: false },
  });
  const [, target, solid, weld] = verdictsOf({ layer: bad, target: amorphous, margins, crystallises: true });
  expect(target).toMatchObject({ outcome: "bad", help: expect.stringContaining("less lamp, more fan") });
  expect(solid).toMatchObject({ outcome: "bad", help: expect.stringContaining("More fan, less lamp") });
  expect(weld).toMatchObject({ outcome: "bad", help: expect.stringContaining("More lamp, less fan") });
});

test("a target that the band lies on both sides of is open, neither good nor bad", () => {
  const layer = predictedLayer(1, {
    verdicts: { state: "undecided", reaches: "within the band", solid: true, welds: true },
  });
  const [state, target] = verdictsOf({
    layer,
    target: { state: "semi-crystalline", share: 1 },
    margins,
    crystallises: true,
  });
  expect(state.text).toContain("Undecided");
  expect(target).toMatchObject({ outcome: "open", help: expect.stringContaining("more lamp, less fan") });
});

test("a zone without a target asks for nothing, and an amorphous polymer is not asked about its state", () => {
  const layer = predictedLayer(1, { verdicts: { state: "amorphous", reaches: null, solid: true, welds: true } });
  const none = { state: "none" as const, share: Number.NaN };
  expect(verdictsOf({ layer, target: none, margins, crystallises: true })[1].text).toBe("No state is wanted here.");
  expect(verdictsOf({ layer, target: none, margins, crystallises: false })).toHaveLength(2);
  const between = { state: "between" as const, share: 0.25 };
  expect(verdictsOf({ layer, target: between, margins, crystallises: true })[1].text).toContain("25 % of the way");
});
