import { expect, test } from "vitest";
import { mmMinToMmS, mmSToMmMin } from "#shared/units/speed.ts";

test("a feed rate of 1500 mm/min is 25 mm/s", () => {
  expect(mmMinToMmS(1500)).toBe(25);
  expect(mmSToMmMin(25)).toBe(1500);
});
