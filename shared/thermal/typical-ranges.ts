import type { Range } from "#shared/formats/thermal.ts";

/** A range that stands in for what a machine document leaves out. */
export interface TypicalRange extends Range {
  source: string;
}

const MEMORY = "order of magnitude from memory of the trade, unverified; measure it, or fit it to readings";

/**
 * What is taken where a machine document is silent: ranges, never facts. Nothing here was measured; a prediction that
 * uses one of them says so.
 */
export const TYPICAL = {
  roomAirC: { low: 18, typical: 23, high: 30, source: MEMORY },
  bedAirRiseC: { low: 0, typical: 10, high: 30, source: MEMORY },
  bedAirDecayMm: { low: 20, typical: 40, high: 80, source: MEMORY },
  /** W/(m²·K), free convection in the room's air */
  h0WM2K: { low: 10, typical: 15, high: 20, source: MEMORY },
  /** W/(m²·K), on top of h0: 60-120 altogether at full fan */
  h1WM2K: { low: 50, typical: 75, high: 100, source: MEMORY },
  fanExponent: { low: 0.5, typical: 0.65, high: 0.8, source: MEMORY },
  /** W/m², what the part absorbs at full duty, absorptivity included */
  absorbedWM2: {
    low: 3_000,
    typical: 5_500,
    high: 8_000,
    source: `${MEMORY}; flux already absorbed, so that the card's absorptivity does not come in a second time`,
  },
  sideShare: { low: 0.3, typical: 0.5, high: 0.7, source: MEMORY },
  /** above 1: a dimmed filament is colder and radiates less than its share of power */
  lampExponent: { low: 1, typical: 1, high: 1.4, source: MEMORY },
  lampLagS: { low: 1, typical: 1, high: 1, source: MEMORY },
  airRiseC: { low: 0, typical: 10, high: 25, source: MEMORY },
  airLagS: { low: 60, typical: 180, high: 600, source: MEMORY },
  bedContactM2KW: { low: 0.0003, typical: 0.001, high: 0.003, source: MEMORY },
} as const satisfies Record<string, TypicalRange>;
