import type { PlacedLayer } from "#shared/plan/layer-placer.ts";

/** Layers in a row, in print order, that the same thing is to be said about. */
export interface LayerRun {
  /** index of the zone they lie in */
  zone: number;
  /** index of the first and of the last layer */
  first: number;
  last: number;
  count: number;
  /** smallest, largest and latest amount noted; what they are, the one who notes knows */
  least: number;
  most: number;
  latest: number;
}

/** Gathers layers that are noted one by one into runs; a run ends with its zone. */
export class LayerRuns {
  readonly runs: LayerRun[] = [];
  private lastPosition = Number.NaN;

  /**
   * @param placed later in print order than the one noted before
   * @param amount e.g. the layer's time
   */
  note({ position, zone, layer }: PlacedLayer, amount: number): void {
    const { index } = layer;
    const run = this.runs[this.runs.length - 1];
    if (position === this.lastPosition + 1 && run.zone === zone) {
      run.last = index;
      run.count++;
      run.latest = amount;
      if (amount < run.least) run.least = amount;
      if (amount > run.most) run.most = amount;
    } else {
      this.runs.push({ zone, first: index, last: index, count: 1, least: amount, most: amount, latest: amount });
    }
    this.lastPosition = position;
  }
}

/** "Layer 12", or "Layers 40–52 (13)". */
export function runText({ first, last, count }: LayerRun): string {
  return count === 1 ? `Layer ${first}` : `Layers ${first}–${last} (${count})`;
}
