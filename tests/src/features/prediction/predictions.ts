import { readFileSync } from "node:fs";
import { join } from "node:path";
import { type Polymer, parsePolymer } from "#shared/formats/polymer.ts";
import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";

/** A card of the samples. */
export const cardOf = (name: string): Polymer =>
  parsePolymer(
    JSON.parse(readFileSync(join(import.meta.dirname, `../../../../samples/polymers/${name}.json`), "utf8")),
  );

/** A layer on which nothing is wrong: amorphous, as wanted. */
export function predictedLayer(index: number, changes: Partial<PredictedLayer> = {}): PredictedLayer {
  return {
    index,
    interlayerC: 100 + index,
    contactC: 250,
    timeAboveTgS: 3,
    timeToSolidS: 1.5,
    highestReheatC: 180,
    crystallinity: 0.01,
    relativeWhenCovered: 0.02,
    band: {
      interlayerC: [80 + index, 130 + index],
      contactC: [230, 260],
      timeAboveTgS: [5, 60],
      timeToSolidS: [1, 4],
      highestReheatC: [150, 210],
      crystallinity: [0, 0.04],
    },
    ...changes,
    verdicts: { state: "amorphous", reaches: "yes", solid: true, welds: true, ...changes.verdicts },
  };
}

export function predictionOf(
  count: number,
  changes: (i: number) => Partial<PredictedLayer> = () => ({}),
): PredictionDocument {
  return {
    format: "quenchline.prediction/1",
    layers: Array.from({ length: count }, (_, i) => predictedLayer(i + 1, changes(i))),
    calibration: "uncalibrated",
    assumed: [{ path: "thermal.roomAirC", low: 18, typical: 23, high: 30, source: "from memory of the trade" }],
    advice: [],
  };
}
