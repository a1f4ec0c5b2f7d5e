import type { Margins } from "#shared/formats/profile.ts";
import type { LayerTarget } from "#shared/plan/layer-targets.ts";
import type { Material } from "#shared/polymers/material.ts";
import type { LayerTable } from "#shared/prediction/layer-table.ts";

/** A layer is aimed at this far below the upper end of an amorphous window at most: warm layers weld better, K. */
const BELOW_TOP_C = 12;

/** Where each layer's interlayer temperature is to lie, by position; NaN where nothing is wanted of the layer. °C */
export interface Goals {
  lowC: Float64Array;
  highC: Float64Array;
  /** what is aimed at within the window; moved while the plan is solved */
  aimC: Float64Array;
}

/**
 * The working windows: an amorphous layer stays below Tg less its margin, a semi-crystalline one above Tg plus its margin
 * and, where it can, below the temperature at which it keeps its shape; both warm enough for the next layer to weld.
 */
export function goalsOf(
  targets: readonly LayerTarget[],
  table: LayerTable,
  material: Material,
  margins: Required<Margins>,
): Goals {
  const column = () => new Float64Array(targets.length).fill(Number.NaN);
  const goals: Goals = { lowC: column(), highC: column(), aimC: column() };
  const { tgC, solidBelowC, weldAboveC } = material;
  const coldTopC = tgC - margins.belowTgC;
  const warmBottomC = tgC + margins.aboveTgC;
  targets.forEach(({ share }, p) => {
    if (Number.isNaN(share)) return;
    const covered = p + 1 < targets.length && table.object[p + 1] === table.object[p];
    // In the first moment the contact lies half-way between the fresh layer and the one below it.
    const weldC = covered ? 2 * weldAboveC - table.depositC[p + 1] : Number.NEGATIVE_INFINITY;
    const coldC = Math.min(Math.max(weldC, table.airC[p]), coldTopC);
    const warmLowC = Math.max(warmBottomC, weldC);
    const warmHighC = Math.max(solidBelowC, warmLowC);
    const between = (cold: number, warm: number) => cold + (warm - cold) * share;
    goals.lowC[p] = between(coldC, warmLowC);
    goals.highC[p] = between(coldTopC, warmHighC);
    const coldAimC = Math.max((coldC + coldTopC) / 2, coldTopC - BELOW_TOP_C);
    goals.aimC[p] = between(coldAimC, (warmLowC + warmHighC) / 2);
  });
  return goals;
}
