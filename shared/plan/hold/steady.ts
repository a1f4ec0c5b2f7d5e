import { startMarch } from "#shared/prediction/march.ts";
import { type ModelInput, makeModel, type PredictionLayer } from "#shared/prediction/model.ts";
import type { ChannelDuties } from "#shared/thermal/forcing.ts";

/** Layers of a like kind until those in the middle no longer know where the part began. */
const LAYERS = 40;
const MIDDLE = 30;

/** What becomes of a layer in the middle of a part of layers like it. */
export interface Steady {
  interlayerC: number;
  crystallinity: number;
  solid: boolean;
}

/**
 * A layer far from all ends, printed over and over with the same duties. The two-lever map goes through hundreds of such
 * states at once, faster, but does not follow how a layer solidifies.
 *
 * @param duties by channel id, 0-1; others are off
 */
export function steadyLayer(
  layer: PredictionLayer,
  duties: ReadonlyMap<string, number>,
  { machine, polymer }: Pick<ModelInput, "machine" | "polymer">,
): Steady {
  const { heightMm } = layer;
  const layers = Array.from({ length: LAYERS }, (_, k) => ({
    ...layer,
    index: k + 1,
    object: 1,
    zMm: layer.zMm + k * heightMm,
    waits: [],
  }));
  const rows: ChannelDuties[] = [...duties].map(([id, duty]) => ({
    id,
    leadS: 0,
    duty: new Float64Array(LAYERS).fill(duty),
  }));
  const { interlayerC, crystallinity, timeToSolidS } = startMarch(makeModel({ layers, machine, polymer }), rows).run();
  return {
    interlayerC: interlayerC[MIDDLE],
    crystallinity: crystallinity[MIDDLE],
    solid: !Number.isNaN(timeToSolidS[MIDDLE]),
  };
}
