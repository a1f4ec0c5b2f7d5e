import { expect, test } from "vitest";
import { logStep } from "#src/features/layer-log/log-keys.ts";

const pins = (key: string, position: number) => logStep(key, position, 100, 12);

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

test("Escape shows the whole part, + and - zoom, other keys are left to the page", () => {
  expect(pins("Escape", 5)).toEqual({ zoom: "whole" });
  expect([pins("+", 5), pins("-", 5)]).toEqual([{ zoom: "in" }, { zoom: "out" }]);
  expect(pins("Tab", 5)).toBeUndefined();
});

test("without layers nothing can be pinned", () => {
  expect(logStep("ArrowUp", -1, 0, 1)).toBeUndefined();
});
