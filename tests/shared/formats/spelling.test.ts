import { expect, test } from "vitest";
import { nearestSpelling } from "#shared/formats/spelling.ts";

test("a slip of a letter or two finds what was meant", () => {
  expect(nearestSpelling("minduty", ["maxDuty", "minDuty"])).toBe("minDuty");
  expect(nearestSpelling("settelS", ["startBoostS", "settleS"])).toBe("settleS");
  expect(nearestSpelling("firmwareRetrackt", ["firmwareRetract"])).toBe("firmwareRetract");
});

test("a word that resembles nothing finds nothing", () => {
  expect(nearestSpelling("colour", ["minDuty", "maxDuty"])).toBeUndefined();
  expect(nearestSpelling("x", ["by"])).toBeUndefined();
  expect(nearestSpelling("anything", [])).toBeUndefined();
  expect(nearestSpelling("a".repeat(100_000), ["id"])).toBeUndefined();
});
