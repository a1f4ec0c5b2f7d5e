/** Small parts as lines of G-code. Material is fed by relative E, as START says. */

export const START = ["G21", "G90", "M83", "M104 S390", "M140 S120", "G28", "M190 S120", "M109 S390"];

export interface Ring {
  x?: number;
  y?: number;
  size?: number;
  /** material for each side, mm */
  e?: number;
}

/** A travel to a corner at this height, and a closed square laid from there. */
export function ring(z: number, { x = 50, y = 50, size = 20, e = 0.8 }: Ring = {}): string[] {
  return [`G0 X${x} Y${y} Z${z} F6000`, ...sides({ x, y, size, e })];
}

/** The square alone, from where the nozzle is. */
export function sides({ x = 50, y = 50, size = 20, e = 0.8 }: Ring = {}): string[] {
  return [`G1 X${x + size} E${e} F1800`, `G1 Y${y + size} E${e}`, `G1 X${x} E${e}`, `G1 Y${y} E${e}`];
}

/** A line of material apart from the part, at its own height. */
export const primeLine = (z: number): string[] => [`G0 X5 Y5 Z${z} F6000`, "G1 X40 E2 F1200"];

/** Rings at these heights, each behind what `before` gives for it. */
export const rings = (
  heights: readonly number[],
  before: (index: number, z: number) => string[] = () => [],
): string[] => heights.flatMap((z, k) => [...before(k, z), ...ring(z)]);

/** Heights 0.2, 0.4, … */
export const heights = (count: number, stepMm = 0.2): number[] =>
  Array.from({ length: count }, (_, k) => Math.round((k + 1) * stepMm * 1000) / 1000);

export const marker = (index: number): string[] => [`;LAYER:${index}`];

export const END = ["G0 Z30 F6000", "M107", "M104 S0"];
