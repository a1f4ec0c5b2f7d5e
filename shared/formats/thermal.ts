import { z } from "zod";
import { fields, Label, numberWithin, perChannel } from "#shared/formats/fields.ts";

/** A quantity that is known only roughly: the prediction's band runs from its low to its high end. */
export interface Range {
  low: number;
  typical: number;
  high: number;
}

/** A number, or { low, typical, high } where it is only known roughly; inside it is always a range. */
function quantity(min: number, max: number) {
  const number = numberWithin(min, max);
  const range = fields({ low: number, typical: number, high: number }).superRefine((range, context) => {
    if (range.low <= range.typical && range.typical <= range.high) return;
    const message = `is out of order: ${range.low}, ${range.typical}, ${range.high}. Give low, typical and high in rising order`;
    context.addIssue({ code: "custom", message, input: range });
  });
  return z.union([number, range], {
    error: `must be a number between ${min} and ${max}, or { low, typical, high } in rising order`,
  });
}

/** A quantity as it stands in a document. */
export type Quantity = number | Range;

export function rangeOf(quantity: Quantity): Range {
  return typeof quantity === "number" ? { low: quantity, typical: quantity, high: quantity } : quantity;
}

/** What surrounds the part: optional in a machine document, and everything in it optional. */
export const Thermal = fields({
  /** which calibration the numbers come from; left out: they were not fitted to readings */
  calibration: Label.optional(),
  roomAirC: quantity(-20, 250).optional(),
  /** walls and panels that the part radiates to; left out: as warm as the air around it */
  wallsC: quantity(-20, 400).optional(),
  /** warm layer above the bed: air = room + riseC · exp(-z / decayMm) */
  bedAir: fields({ riseC: quantity(0, 200).optional(), decayMm: quantity(0.1, 10_000).optional() }).optional(),
  /** h = h0 + sum over the fans of h1 · duty^exponent, W/(m²·K) */
  convection: fields({
    h0WM2K: quantity(0.1, 500).optional(),
    fans: perChannel(
      fields({ h1WM2K: quantity(0, 2_000).optional(), exponent: quantity(0.1, 3).optional() }),
    ).optional(),
  }).optional(),
  lamps: perChannel(
    fields({
      /** irradiance of the part's top at full duty, before absorption, W/m² */
      fluxAtFullWM2: quantity(0, 500_000).optional(),
      /** strength on the part's sides relative to its top, 0-1 */
      sideShare: quantity(0, 1).optional(),
      /** irradiance = full · duty^exponent */
      exponent: quantity(0.1, 4).optional(),
      /** first-order lag of the filament, s */
      lagS: quantity(0, 120).optional(),
    }),
  ).optional(),
  /** the air around the part warms with the lamps, slowly */
  surroundings: fields({
    riseAtFullLampC: quantity(0, 200).optional(),
    lagS: quantity(0, 36_000).optional(),
  }).optional(),
  /** contact resistance between bed and first layer, m²·K/W */
  bedContactM2KW: quantity(0, 1).optional(),
});
export type Thermal = z.infer<typeof Thermal>;
