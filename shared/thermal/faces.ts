import type { Column } from "#shared/thermal/column.ts";

/**
 * Follows what happens at the faces of blocks, so that the layers of a block can be told apart: within a block
 * temperature runs from its lower face by its middle to its upper face. Deep inside, where blocks are, it changes
 * slowly; one look for every layer that is laid is enough.
 *
 * @param dtS since the last look
 */
export function lookAtFaces(column: Column, dtS: number): void {
  const { count, tempC, upKW, downKW, faceC, layers, rates, material } = column;
  const { lowGained, highGained, lowAboveS, highAboveS } = column;
  const { tgC } = material;
  for (let i = 0; i + 1 < count; i++) {
    const before = faceC[i];
    const after = tempC[i] + ((tempC[i + 1] - tempC[i]) * upKW[i]) / (upKW[i] + downKW[i + 1]);
    faceC[i] = after;
    if (before <= tgC && after <= tgC) continue;
    if (layers[i] === 1 && layers[i + 1] === 1) continue;
    const gain = rates === null ? 0 : rates.mean(before, after) * dtS;
    const aboveS = timeAboveS(before, after, tgC, dtS);
    highGained[i] += gain;
    highAboveS[i] += aboveS;
    lowGained[i + 1] += gain;
    lowAboveS[i + 1] += aboveS;
  }
  // The lowest and the highest face are taken as the middles next to them.
  column.lowGained[0] = column.gained[0];
  column.lowAboveS[0] = column.aboveTgS[0];
}

/** How long a temperature that runs evenly is above a limit, s. */
export function timeAboveS(fromC: number, toC: number, limitC: number, dtS: number): number {
  if (fromC > limitC) return toC > limitC ? dtS : (dtS * (fromC - limitC)) / (fromC - toC);
  return toC > limitC ? (dtS * (toC - limitC)) / (toC - fromC) : 0;
}

/** Value for a layer in a block, from those at its lower face, middle and upper face; `place` runs from 0 to 1. */
export function within(low: number, middle: number, high: number, place: number): number {
  return place < 0.5 ? low + (middle - low) * 2 * place : middle + (high - middle) * (2 * place - 1);
}
