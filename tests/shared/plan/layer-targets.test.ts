import { expect, test } from "vitest";
import { layerTargets } from "#shared/plan/layer-targets.ts";
import { layersOf, profileWith } from "#tests/shared/plan/documents.ts";

const hold = { channel: "lamp", rule: "hold" };
const statesOf = (zones: object[], layers = layersOf(10)) =>
  layerTargets(layers, profileWith(zones.map((zone) => ({ heating: hold, ...zone }))));
const LETTERS = { amorphous: "a", "semi-crystalline": "s", none: "-", between: "b" };
const letters = (zones: object[], layers = layersOf(10)): string =>
  statesOf(zones, layers)
    .map(({ state }) => LETTERS[state])
    .join("");

test("a zone's target is that of all its layers", () => {
  const zones = [
    { name: "base", from: 0, to: 0.8, target: "semi-crystalline" },
    { name: "lip", from: 0.8, target: "amorphous" },
  ];
  expect(letters(zones)).toBe("ssssaaaaaa");
});

test("alternating bands go by layers of the zone, whatever the layers below it", () => {
  const pattern = { kind: "alternating", amorphousLayers: 1, semiCrystallineLayers: 2 };
  const base = { name: "base", from: 0, to: 0.6, target: "amorphous" };
  expect(letters([base, { name: "bands", from: 0.6, target: "none", pattern }])).toBe("aaaassassa");
  const first = { ...pattern, first: "semi-crystalline" };
  expect(letters([base, { name: "bands", from: 0.6, target: "none", pattern: first }])).toBe("aaassassas");
});

test("in sequential objects each one's bands begin anew", () => {
  const pattern = { kind: "alternating", amorphousLayers: 2, semiCrystallineLayers: 1 };
  const layers = layersOf(8, (i) => ({ object: i < 4 ? 1 : 2, zMm: 0.2 * ((i % 4) + 1) }));
  expect(letters([{ name: "bands", from: 0, target: "none", pattern }], layers)).toBe("aasaaasa");
});

test("a graded zone goes from one state at its lowest layer to the other at its highest, by height", () => {
  const pattern = { kind: "graded", from: "semi-crystalline", to: "amorphous" };
  const zones = [
    { name: "base", from: 0, to: 1, target: "semi-crystalline" },
    { name: "way", from: 1, target: "none", pattern },
  ];
  const targets = statesOf(zones);
  expect(targets.map(({ state }) => LETTERS[state]).join("")).toBe("ssssssbbba");
  expect(targets.slice(5).map(({ share }) => Number(share.toFixed(3)))).toEqual([1, 0.75, 0.5, 0.25, 0]);
});
