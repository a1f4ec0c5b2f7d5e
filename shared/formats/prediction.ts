import { z } from "zod";
import { parseDocument, writeDocument } from "#shared/formats/document.ts";
import { Finite, fields, Share, wholeWithin } from "#shared/formats/fields.ts";

const LayerIndex = wholeWithin(1, 1e9);
const FromTo = z.tuple([Finite, Finite], { error: "must be a pair [low, high]" });

/** What a layer is expected to do, as answers to a person's questions. */
export const Verdicts = fields({
  /** by predicted crystallinity against the margins; undecided: between the two */
  state: z.enum(["amorphous", "semi-crystalline", "undecided"]),
  /** the zone's target is met over the whole band; null where the zone has none */
  reaches: z.enum(["yes", "no", "within the band"]).nullable(),
  /** keeps its shape before the nozzle returns */
  solid: z.boolean(),
  /** the contact with the layer below passes the card's weld limit */
  welds: z.boolean(),
});
export type Verdicts = z.infer<typeof Verdicts>;

export const PredictedLayer = fields({
  index: LayerIndex,
  /** mean of the layer just before the next one covers it; of the last layer at the end of its own time, °C */
  interlayerC: Finite,
  /** where the fresh layer meets the one below, or the bed, in the first moment, °C */
  contactC: Finite,
  /** over the whole history, cooling included; null where Tg lies below the room, so that it is never left, s */
  timeAboveTgS: Finite.nullable(),
  /** from the layer's begin; null: not before it was covered, s */
  timeToSolidS: Finite.nullable(),
  /** after it was covered; null for a layer that never was, °C */
  highestReheatC: Finite.nullable(),
  /** absolute, after cooling to the room, 0-1 */
  crystallinity: Share,
  /** share of the attainable crystallinity at the moment it was covered, 0-1 */
  relativeWhenCovered: Share,
  /** worst cases: all uncertain inputs at their hot, then at their cold end; null where no band was asked for */
  band: fields({
    interlayerC: FromTo,
    contactC: FromTo,
    /** null as above */
    timeAboveTgS: FromTo.nullable(),
    /** soonest and latest; null: not before it was covered */
    timeToSolidS: z.tuple([Finite.nullable(), Finite.nullable()], { error: "must be a pair [low, high]" }),
    highestReheatC: FromTo.nullable(),
    crystallinity: FromTo,
  }).nullable(),
  verdicts: Verdicts,
});
export type PredictedLayer = z.infer<typeof PredictedLayer>;

/** An input that the machine document leaves out, so that a stated range stands in for it. */
export const Assumed = fields({ path: z.string(), low: Finite, typical: Finite, high: Finite, source: z.string() });
export type Assumed = z.infer<typeof Assumed>;

/** A prediction document, `quenchline.prediction/1`: an estimate to be confirmed by trial. */
export const PredictionDocument = fields({
  format: z.literal("quenchline.prediction/1"),
  layers: z.array(PredictedLayer),
  /** "uncalibrated", or the calibration that the machine document names */
  calibration: z.string(),
  assumed: z.array(Assumed),
  /** assumptions made for this part, and what fan and heater are not expected to reach */
  advice: z.array(fields({ layer: LayerIndex, code: z.string(), message: z.string() })),
});
export type PredictionDocument = z.infer<typeof PredictionDocument>;

/** @throws Refusal `bad-prediction` naming every problem with its path */
export function parsePrediction(json: unknown): PredictionDocument {
  return parseDocument(PredictionDocument, json, "prediction");
}

/** The document as JSON text; `parsePrediction` reads it back unchanged. */
export function writePrediction(prediction: PredictionDocument): string {
  return writeDocument(PredictionDocument, prediction);
}
