/** What a march finds out about the layers, by position in print order. */
export interface LayerResults {
  /** °C at the end of the layer's own time and waits */
  interlayerC: Float64Array;
  /** °C where the fresh layer meets what lies below, in the first moment */
  contactC: Float64Array;
  /** so far; complete once the march is finished */
  timeAboveTgS: Float64Array;
  /** from the layer's begin; NaN: not before it was covered */
  timeToSolidS: Float64Array;
  /** so far, after it was covered; NaN: it never was */
  highestReheatC: Float64Array;
  /** share of the attainable crystallinity at the end of the layer's own time */
  relativeWhenCovered: Float64Array;
  /** ∫ Kn dt so far; the march's own state */
  integral: Float64Array;
  /** absolute; known once the march, or the layer's object, is finished */
  crystallinity: Float64Array;
}

export const RESULT_NAMES = [
  "interlayerC",
  "contactC",
  "timeAboveTgS",
  "timeToSolidS",
  "highestReheatC",
  "relativeWhenCovered",
  "integral",
  "crystallinity",
] as const satisfies readonly (keyof LayerResults)[];

export function newResults(count: number): LayerResults {
  const column = () => new Float64Array(count);
  return {
    interlayerC: column(),
    contactC: column(),
    timeAboveTgS: column(),
    timeToSolidS: column(),
    highestReheatC: column(),
    relativeWhenCovered: column(),
    integral: column(),
    crystallinity: column(),
  };
}

/** What is known of a layer that is about to be laid: nothing, whatever an earlier attempt has left. */
export function clearResults(results: LayerResults, position: number): void {
  for (const name of RESULT_NAMES) results[name][position] = 0;
  results.timeToSolidS[position] = Number.NaN;
  results.highestReheatC[position] = Number.NaN;
}
