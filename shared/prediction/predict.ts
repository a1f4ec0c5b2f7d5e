import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";
import type { Margins } from "#shared/formats/profile.ts";
import { marginsOf } from "#shared/polymers/material.ts";
import type { LayerResults } from "#shared/prediction/layer-results.ts";
import { startMarch } from "#shared/prediction/march.ts";
import { makeModel, type PredictionLayer } from "#shared/prediction/model.ts";
import { predictionAdvice } from "#shared/prediction/prediction-advice.ts";
import { verdictsOf, type WantedState } from "#shared/prediction/verdicts.ts";
import { Refusal } from "#shared/refusal.ts";
import type { ChannelDuties } from "#shared/thermal/forcing.ts";
import { assumedValues, type End } from "#shared/thermal/surroundings.ts";

export interface PredictInput {
  /** in print order */
  layers: readonly PredictionLayer[];
  machine: Machine;
  polymer: Polymer;
  /** a channel that is not among them is off */
  duties: readonly ChannelDuties[];
  /** one for every layer */
  wanted: readonly WantedState[];
  /** the profile's margins, laid over the card's */
  margins?: Margins;
  /** also a hot and a cold run (default); without, the cost is a third */
  band?: boolean;
}

/**
 * What every layer of a print is expected to become: an estimate, to be confirmed by trial.
 *
 * The band is the worst case, not a likely one: one run with all uncertain inputs at their hot end, one at their cold
 * end. How much of the lamp's light is absorbed is the largest of them.
 *
 * @throws Refusal `amorphous-out-of-reach` where a layer is to be amorphous and the card says it cannot,
 * `half-times-unusable` where the card's half-times fit no bell
 */
export function predict(input: PredictInput): PredictionDocument {
  const { layers, machine, polymer, duties, wanted, band = true } = input;
  refuseOutOfReach(layers, polymer, wanted);
  const model = makeModel({ layers, machine, polymer });
  const typical = startMarch(model, duties).run();
  const runAt = (end: End) => startMarch(makeModel({ layers, machine, polymer, end }), duties).run();
  const ends = band ? [runAt("hot"), runAt("cold")] : [];
  const margins = marginsOf(polymer, input.margins);
  const tgBelowRoom = model.material.tgC <= model.surroundings.roomAirC;

  const predicted = layers.map(({ index }, p): PredictedLayer => {
    const interlayerC = rangeAt(typical, ends, "interlayerC", p);
    const crystallinity = rangeAt(typical, ends, "crystallinity", p);
    const facts = {
      contactC: typical.contactC[p],
      timeToSolidS: typical.timeToSolidS[p],
      crystallinity: typical.crystallinity[p],
      lowCrystallinity: crystallinity[0],
      highCrystallinity: crystallinity[1],
    };
    return {
      index,
      interlayerC: typical.interlayerC[p],
      contactC: typical.contactC[p],
      timeAboveTgS: tgBelowRoom ? null : typical.timeAboveTgS[p],
      timeToSolidS: nullable(typical.timeToSolidS[p]),
      highestReheatC: nullable(typical.highestReheatC[p]),
      crystallinity: typical.crystallinity[p],
      relativeWhenCovered: typical.relativeWhenCovered[p],
      band: band
        ? {
            interlayerC,
            contactC: rangeAt(typical, ends, "contactC", p),
            timeAboveTgS: tgBelowRoom ? null : rangeAt(typical, ends, "timeAboveTgS", p),
            timeToSolidS: soonestAndLatest(typical, ends, p),
            highestReheatC: Number.isNaN(typical.highestReheatC[p])
              ? null
              : rangeAt(typical, ends, "highestReheatC", p),
            crystallinity,
          }
        : null,
      verdicts: verdictsOf(facts, wanted[p], model.material, margins),
    };
  });
  return {
    format: "quenchline.prediction/1",
    layers: predicted,
    calibration: machine.thermal?.calibration ?? "uncalibrated",
    assumed: assumedValues(machine),
    advice: predictionAdvice({ predicted, wanted, model, margins }),
  };
}

function refuseOutOfReach(layers: readonly PredictionLayer[], polymer: Polymer, wanted: readonly WantedState[]): void {
  const at = polymer.amorphousReachable ? -1 : wanted.indexOf("amorphous");
  if (at < 0) return;
  throw new Refusal(
    "amorphous-out-of-reach",
    `Layer ${layers[at].index} is to be amorphous, which is out of reach for ${polymer.name}: it crystallises too fast.`,
    'Use "semi-crystalline" or "none" as the target, or another polymer.',
    { layer: layers[at].index },
  );
}

function rangeAt(
  typical: LayerResults,
  ends: readonly LayerResults[],
  name: "interlayerC" | "contactC" | "timeAboveTgS" | "highestReheatC" | "crystallinity",
  position: number,
): [number, number] {
  const values = [typical, ...ends].map((results) => results[name][position]);
  return [Math.min(...values), Math.max(...values)];
}

/** A run in which the layer is covered first counts as the latest. */
function soonestAndLatest(
  typical: LayerResults,
  ends: readonly LayerResults[],
  position: number,
): [number | null, number | null] {
  const seconds = [typical, ...ends].map(({ timeToSolidS }) => timeToSolidS[position]);
  const known = seconds.filter((value) => !Number.isNaN(value));
  return [known.length > 0 ? Math.min(...known) : null, known.length === seconds.length ? Math.max(...known) : null];
}

const nullable = (value: number): number | null => (Number.isNaN(value) ? null : value);
