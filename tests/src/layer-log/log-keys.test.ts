import { expect, test } from "vitest";
import { logStep } from "#src/features/layer-log/log-keys.ts";

const pins = (key: string, pinned: number, { shiftKey = false, marked = -1 } = {}) =>
  logStep({ key, shiftKey }, { pinned, marked, count: 100, page: 12 });

test("arrow keys walk layer by layer, page keys further, Home and End to the ends", () => {
  expect(["ArrowUp", "ArrowDown", "PageUp", "PageDown", "Home", "End"].map((key) => pins(key, 50))).toEqual([
    { pin: 51 },
    { pin: 49 },
    { pin: 62 },
    { pin: 38 },
    { pin: 0 },
    { pin: 99 },
  ]);
});

test("walking ends at the first and the last layer", () => {
  expect(pins("ArrowUp", 99)).toEqual({ pin: 99 });
  expect(pins("PageDown", 3)).toEqual({ pin: 0 });
});

test("with nothing pinned the first step lands on an end of the part", () => {
  expect([pins("ArrowUp", -1), pins("ArrowDown", -1), pins("PageUp", -1)]).toEqual([
    { pin: 0 },
    { pin: 99 },
    { pin: 11 },
  ]);
});

test("with Shift the same keys mark a band, from the pinned layer or on from its end, and Enter shows it", () => {
  expect(pins("ArrowUp", 50, { shiftKey: true })).toEqual({ mark: 51 });
  expect(pins("ArrowUp", 50, { shiftKey: true, marked: 60 })).toEqual({ mark: 61 });
  expect(pins("End", 50, { shiftKey: true, marked: 60 })).toEqual({ mark: 99 });
  expect(pins("Enter", 50, { marked: 60 })).toEqual({ zoom: "band" });
  expect(pins("Enter", 50)).toBeUndefined();
});

test("Escape steps back, + and - zoom, other keys are left to the page", () => {
  expect(pins("Escape", 5)).toEqual({ back: true });
  expect([pins("+", 5), pins("-", 5)]).toEqual([{ zoom: "in" }, { zoom: "out" }]);
  expect(pins("Tab", 5)).toBeUndefined();
});

test("without layers nothing can be pinned", () => {
  expect(logStep({ key: "ArrowUp", shiftKey: false }, { pinned: -1, marked: -1, count: 0, page: 1 })).toBeUndefined();
});
