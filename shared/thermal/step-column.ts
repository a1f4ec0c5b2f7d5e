import type { Column } from "#shared/thermal/column.ts";

/** Stefan-Boltzmann constant, CODATA 2018, W/(m²·K⁴). */
export const STEFAN_BOLTZMANN = 5.670374419e-8;
export const KELVIN = 273.15;

const GAMMA = 0.435866521508459;
const C21 = -1.015617108387771;
const C31 = 4.07599564525377;
const C32 = 9.20767942983308;
const M2 = 6.169794704382825;
const M3 = -0.4277225654321857;
/** What each stage's flux across a border counts in the heat that crosses it during the step; they add up to 1. */
const W3 = GAMMA * M3;
const W2 = GAMMA * (M2 + W3 * C32);
const W1 = GAMMA * (1 + W2 * C21 + W3 * C31);

/**
 * Moves a column on by one step with the Rosenbrock method ROS3 (A. Sandu et al. 1997, Atmos. Environ. 31, 3459-3472;
 * coefficients from memory, their order is held by a test): third order, L-stable, so that what is fast dies out as it
 * does in heat conduction, and its inner stages never overshoot.
 *
 *     (1/(γ dt) - J) k1 = f(u)                      u' = u + k1
 *     (1/(γ dt) - J) k2 = f(u') + c21 k1 / dt
 *     (1/(γ dt) - J) k3 = f(u') + (c31 k1 + c32 k2) / dt
 *     u(t + dt) = u + k1 + m2 k2 + m3 k3
 *
 * J, the slope of f, holds conduction, convection and radiation, so it is tridiagonal and a step costs a handful of
 * passes over the nodes, each fused with what it needs. f is kept in watts and every row multiplied by its heat capacity.
 * The flux of lamps and the strength of convection are means over the step.
 *
 * Crystallising is not stiff: its heat is foreseen from the rate at the step's begin and put right at its end, by the
 * integral of the rate over the step's change of temperature. Heat that crosses the column's borders is booked as the
 * method moves it, so that the balance closes to rounding.
 *
 * @param dtS >= 0
 * @param first lowest node that is moved; the one below it stays as warm as it is, and what passes from it is kept in
 * `column.fromBelowJ` for the step in which it will be moved
 */
export function stepColumn(column: Column, dtS: number, first = 0): void {
  const { count, tempC, capacityJK, sideM2, topM2, airC, linkWK, work, material, rates, latent } = column;
  if (count === 0 || !(dtS > 0)) return;
  const { k1, k2, k3, ratio, inverse, lossWK, radiationWK, foreseenJ, wallsK4, fromAbove } = work;
  const { hWM2K, topFluxWM2, sideFluxWM2, airRiseC, wallsC, fromAboveW: sourceW } = column;
  const belowC = first === 0 ? column.bedC : tempC[first - 1];
  const belowWK = first === 0 ? column.bedLinkWK : linkWK[first - 1];
  const { latentJ, integral, relative, gained, aboveTgS, highestC, growth } = column;
  const radiance = material.emissivity * STEFAN_BOLTZMANN;
  const ownWallsK4 = wallsC === null ? -1 : (wallsC + airRiseC + KELVIN) ** 4;
  const g = GAMMA * dtS;
  const perS = 1 / dtS;
  const last = count - 1;

  // First stage: f(u), the matrix, and the way up of the tridiagonal solution.
  let air1W = 0;
  let radiation1W = 0;
  let lampW = 0;
  let convectionW = 0;
  let radiationW = 0;
  let fromBelowW = belowWK * (belowC - tempC[first]);
  let topBelow1W = fromBelowW;
  const below1W = fromBelowW;
  let linkBelowWK = belowWK;
  let up = 0;
  for (let i = first; i < count; i++) {
    const t = tempC[i];
    const areaM2 = sideM2[i] + topM2[i];
    const aroundC = airC[i] + airRiseC;
    const k = t + KELVIN;
    const kCubed = k * k * k;
    const aroundK = aroundC + KELVIN;
    const aroundSquared = aroundK * aroundK;
    const walls = ownWallsK4 >= 0 ? ownWallsK4 : aroundSquared * aroundSquared;
    wallsK4[i] = walls;
    const loss = areaM2 * hWM2K;
    const slope = 4 * areaM2 * radiance * kCubed;
    convectionW = loss * (t - aroundC);
    radiationW = areaM2 * radiance * (kCubed * k - walls);
    const lightW = topM2[i] * topFluxWM2 + sideM2[i] * sideFluxWM2;
    air1W += convectionW;
    radiation1W += radiationW;
    lampW += lightW;
    lossWK[i] = loss;
    radiationWK[i] = slope;
    const link = i < last ? linkWK[i] : 0;
    const fromAboveW = i < last ? link * (tempC[i + 1] - t) : sourceW;
    let f = lightW - convectionW - radiationW + fromBelowW + fromAboveW;
    if (latent) {
      const rate = relative[i] < 1 ? rates!.at(t) : 0;
      foreseenJ[i] = rate > 0 ? latentJ[i] * (growth.at(integral[i] + rate * dtS) - relative[i]) : 0;
      f += foreseenJ[i] * perS;
    }
    const off = i === first ? 0 : g * linkBelowWK;
    const m = i === first ? 0 : off * inverse[i - 1];
    const pivot = 1 / (capacityJK[i] + g * (loss + slope + linkBelowWK + link) - off * m);
    inverse[i] = pivot;
    fromAbove[i] = g * link * pivot;
    ratio[i] = m;
    up = g * f + m * up;
    k1[i] = up;
    topBelow1W = fromBelowW;
    fromBelowW = -fromAboveW;
    linkBelowWK = link;
  }
  const topAir1W = convectionW;
  const topRadiation1W = radiationW;
  wayDown(k1, inverse, fromAbove, first, last);

  // Second and third stage, both with f at u' = u + k1.
  let air2W = 0;
  let radiation2W = 0;
  let next = tempC[first] + k1[first];
  fromBelowW = belowWK * (belowC - next);
  const below2W = fromBelowW;
  let topBelow2W = fromBelowW;
  up = 0;
  for (let i = first; i < count; i++) {
    const t = next;
    const aroundC = airC[i] + airRiseC;
    const k = t + KELVIN;
    const kSquared = k * k;
    convectionW = lossWK[i] * (t - aroundC);
    radiationW = (sideM2[i] + topM2[i]) * radiance * (kSquared * kSquared - wallsK4[i]);
    air2W += convectionW;
    radiation2W += radiationW;
    let fromAboveW = sourceW;
    if (i < last) {
      next = tempC[i + 1] + k1[i + 1];
      fromAboveW = linkWK[i] * (next - t);
    }
    let f = topM2[i] * topFluxWM2 + sideM2[i] * sideFluxWM2 - convectionW - radiationW + fromBelowW + fromAboveW;
    if (latent) {
      // u' is about the middle of the step, so its rate foresees better.
      const rate = relative[i] < 1 ? rates!.at(t) : 0;
      if (rate > 0 || foreseenJ[i] > 0) {
        const grown = growth.at(integral[i] + rate * dtS) - relative[i];
        f += (latentJ[i] * grown - W1 * foreseenJ[i]) * (perS / (W2 + W3));
        foreseenJ[i] = latentJ[i] * grown;
      }
    }
    // The third stage begins from the same flux.
    k3[i] = g * f;
    up = g * f + GAMMA * C21 * capacityJK[i] * k1[i] + ratio[i] * up;
    k2[i] = up;
    topBelow2W = fromBelowW;
    fromBelowW = -fromAboveW;
  }
  wayDown(k2, inverse, fromAbove, first, last);
  up = 0;
  for (let i = first; i < count; i++) {
    up = k3[i] + GAMMA * capacityJK[i] * (C31 * k1[i] + C32 * k2[i]) + ratio[i] * up;
    k3[i] = up;
  }

  // The way down of the third, the step itself, the crystals, and what the layers will be told.
  const { tgC } = material;
  const tmC = material.tmC ?? Number.POSITIVE_INFINITY;
  let grownJ = 0;
  let air3W = 0;
  let radiation3W = 0;
  let third = 0;
  for (let i = last; i >= first; i--) {
    const before = tempC[i];
    third = k3[i] * inverse[i] + fromAbove[i] * third;
    k3[i] = third;
    const weighted = W1 * k1[i] + W2 * k2[i] + W3 * third;
    air3W += lossWK[i] * weighted;
    radiation3W += radiationWK[i] * weighted;
    let after = before + k1[i] + M2 * k2[i] + M3 * third;
    const gain = rates !== null && (before > tgC || after > tgC) ? rates.mean(before, after) * dtS : 0;
    let grownHereJ = 0;
    if (gain > 0) {
      integral[i] += gain;
      gained[i] += gain;
      if (relative[i] < 1) {
        const reached = growth.at(integral[i]);
        grownHereJ = latentJ[i] * (reached - relative[i]);
        relative[i] = reached;
      }
    }
    if (latent) {
      after += (grownHereJ - foreseenJ[i]) / capacityJK[i];
      grownJ += grownHereJ;
    }
    tempC[i] = after;
    if (before > tgC) aboveTgS[i] += after > tgC ? dtS : (dtS * (before - tgC)) / (before - after);
    else if (after > tgC) aboveTgS[i] += (dtS * (after - tgC)) / (after - before);
    if (after > highestC[i]) highestC[i] = after;
    if (after > tmC && relative[i] > 0) melt(column, i, tmC);
  }

  const { heat } = column;
  const weightedFirst = W1 * k1[first] + W2 * k2[first] + W3 * k3[first];
  const weightedTop = W1 * k1[last] + W2 * k2[last] + W3 * k3[last];
  const both = (firstW: number, secondW: number, slopeW: number) => dtS * (W1 * firstW + (W2 + W3) * secondW + slopeW);
  heat.toAirJ += both(air1W, air2W, air3W);
  heat.radiatedJ += both(radiation1W, radiation2W, radiation3W);
  heat.fromLampJ += dtS * lampW;
  column.fromBelowJ = both(below1W, below2W, -belowWK * weightedFirst);
  if (first === 0) heat.fromBedJ += column.fromBelowJ;
  heat.fromCrystallisingJ += grownJ;
  const alone = last === first;
  const weightedBelow = alone ? 0 : W1 * k1[last - 1] + W2 * k2[last - 1] + W3 * k3[last - 1];
  const linkToTopWK = alone ? belowWK : linkWK[last - 1];
  column.topFromBelowJ = both(topBelow1W, topBelow2W, linkToTopWK * (weightedBelow - weightedTop));
  column.topToAirJ = both(topAir1W, convectionW, lossWK[last] * weightedTop);
  column.topRadiatedJ = both(topRadiation1W, radiationW, radiationWK[last] * weightedTop);
}

/**
 * Moves the nodes below `count` alone, after those above have been moved with `first = count`: in one step over their
 * whole time, with the heat that has passed between them.
 */
export function stepDeep(column: Column, dtS: number, count: number, passedUpJ: number): void {
  const whole = column.count;
  column.count = count;
  column.fromAboveW = -passedUpJ / dtS;
  stepColumn(column, dtS);
  column.fromAboveW = 0;
  column.count = whole;
}

/** Second half of the tridiagonal solution, in place. */
function wayDown(k: Float64Array, inverse: Float64Array, fromAbove: Float64Array, first: number, last: number): void {
  let above = 0;
  for (let i = last; i >= first; i--) {
    above = k[i] * inverse[i] + fromAbove[i] * above;
    k[i] = above;
  }
}

/** Crystals above their melting temperature melt as far as the heat above it reaches, and hold it there meanwhile. */
function melt(column: Column, node: number, tmC: number): void {
  const { tempC, capacityJK, latentJ, relative, heat, latent } = column;
  const crystalJ = latent ? latentJ[node] * relative[node] : 0;
  const surplusJ = capacityJK[node] * (tempC[node] - tmC);
  const stays = surplusJ >= crystalJ ? 0 : 1 - surplusJ / crystalJ;
  const meltedJ = crystalJ * (1 - stays);
  column.onMelt(node, stays);
  tempC[node] -= meltedJ / capacityJK[node];
  heat.fromCrystallisingJ -= meltedJ;
  column.keepCrystals(node, stays);
}
