import { expect, test } from "vitest";
import { countText, durationText } from "#shared/units/words.ts";

test.each([
  [7.44, "7.4 s"],
  [59.94, "59.9 s"],
  [59.97, "1 min 00 s"],
  [252, "4 min 12 s"],
  [3_599.6, "1 h 00 min"],
  [9_960, "2 h 46 min"],
])("%d seconds are said as %s", (seconds, text) => expect(durationText(seconds)).toBe(text));

test.each([
  [0, "0"],
  [999, "999"],
  [1_000, "1\u202f000"],
  [46_732, "46\u202f732"],
  [1_234_567, "1\u202f234\u202f567"],
])("%d is written with its thousands apart", (count, text) => expect(countText(count)).toBe(text));
