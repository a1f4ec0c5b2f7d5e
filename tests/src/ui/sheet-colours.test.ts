import { expect, test } from "vitest";
import { SHEETS } from "#src/ui/sheet-colours.ts";

/** Relative luminance and contrast as WCAG 2.2 defines them. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const share = Number.parseInt(hex.slice(at, at + 2), 16) / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}
function contrast(one: string, other: string): number {
  const [low, high] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (high + 0.05) / (low + 0.05);
}

for (const [name, colours] of Object.entries(SHEETS)) {
  const surfaces = [colours.paper, colours.sheet, colours.well];

  test.each(["ink", "soft", "amberInk", "coolInk", "heatInk"] as const)(
    `on the ${name} sheet %s is dark enough for text`,
    (colour) => {
      for (const surface of surfaces) expect(contrast(colours[colour], surface)).toBeGreaterThanOrEqual(4.5);
    },
  );

  test.each(["rule", "boneEdge", "cool", "heat"] as const)(`on the ${name} sheet %s can bound and draw`, (colour) => {
    for (const surface of surfaces) expect(contrast(colours[colour], surface)).toBeGreaterThanOrEqual(3);
  });
}
