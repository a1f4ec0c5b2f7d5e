import type { Polymer, Sourced } from "#shared/formats/polymer.ts";

/** A card to begin from: the right order of magnitude, and nothing that anybody should rely on. */
export function newPolymer(): Polymer {
  const assumed = (value: number): Sourced => ({ value, source: "Placeholder: replace it", confidence: "unverified" });
  return {
    format: "quenchline.polymer/1",
    name: "New polymer",
    variant: "",
    tgC: assumed(140),
    tmC: assumed(340),
    solidBelowC: assumed(290),
    solidAtRelativeCrystallinity: assumed(0.3),
    weldAboveC: assumed(200),
    amorphousReachable: true,
    margins: {
      belowTgC: assumed(10),
      aboveTgC: assumed(10),
      maxCrystallinity: assumed(0.05),
      minCrystallinity: assumed(0.2),
    },
    densityKgM3: assumed(1_300),
    conductivityWMK: assumed(0.25),
    heatCapacityJKgK: assumed(1_500),
    emissivity: assumed(0.9),
    lampAbsorptivity: { low: assumed(0.4), typical: assumed(0.6), high: assumed(0.8) },
    crystallinity: {
      heatOfFusionJG: assumed(130),
      attainable: assumed(0.35),
      avramiN: assumed(2.5),
      fastestPerS: assumed(0.2),
      fastestAtC: assumed(230),
      halfWidthC: assumed(40),
    },
  };
}
