import { integralOf, relativeCrystallinity } from "#shared/crystallinity/avrami.ts";
import type { Material } from "#shared/polymers/material.ts";
import { clearResults, type LayerResults, newResults, RESULT_NAMES } from "#shared/prediction/layer-results.ts";
import type { Model } from "#shared/prediction/model.ts";
import { coolingSteps, layerSteps, reachInLayers } from "#shared/prediction/steps.ts";
import { coarsen } from "#shared/thermal/coarsen.ts";
import { Column, type SavedColumn } from "#shared/thermal/column.ts";
import { lookAtFaces, within } from "#shared/thermal/faces.ts";
import { type ChannelDuties, Forcing, type Override } from "#shared/thermal/forcing.ts";
import { stepColumn, stepDeep } from "#shared/thermal/step-column.ts";

/** A march as it was at some layer. */
export interface SavedMarch {
  next: number;
  column: SavedColumn;
  forcing: number[];
  results: Float64Array;
}

/** Follows a layer step by step: what its node was warmed by, K, and the heat of what crystallised in it, J. */
export type Watch = (dtS: number, column: Column, warmedC: number, crystallisedJ: number) => void;

/** A stretch of the time for which layer p is the top; `fromS` counts from the layer's begin. */
interface Stretch {
  p: number;
  fromS: number;
  timeS: number;
  override?: Override;
  watch?: Watch;
}

/** After the print everything cools until it is this far below Tg, or this cold, whichever is warmer. */
const COOL_BELOW_TG_C = 20;
const COLD_C = 50;
/** An unheated bed loses 63 % of its excess in this time; from memory of the trade, unverified. */
const BED_TAU_S = 900;
const MOST_COOLING_S = 6 * 3600;

/** Begins to print the layers of a model, with these duties; see `March`. */
export function startMarch(model: Model, duties: readonly ChannelDuties[]): March {
  return new March(model, duties);
}

/**
 * Lays layer after layer on a column and follows each one's temperature and crystals until all is cold.
 *
 * A node appears when its layer begins, at the temperature of the nozzle, and is the top for the layer's time and waits.
 * Sequential objects each have a column of their own; a finished one cools by itself, out of the lamps' light.
 *
 * The duties are read as the march goes: those of the layer that is laid and, within the lead, of those after it. They
 * may be changed between layers, which is how a planner tries them:
 *
 *     const saved = march.save(); duty[march.next] = 0.4; march.layer(); …look…; march.restore(saved);
 */
export class March {
  /** position of the layer that comes next, from 0 */
  next = 0;
  readonly results: LayerResults;
  /** the column of the present object; its top node is the layer laid last */
  readonly column: Column;
  readonly model: Model;
  private readonly forcing: Forcing;
  private readonly tell = (node: number) => this.tellLayers(node);

  constructor(model: Model, duties: readonly ChannelDuties[]) {
    this.model = model;
    this.results = newResults(model.layers.count);
    const { bedContactM2KW, wallsC } = model.surroundings;
    this.column = new Column(model.material, { bedContactM2KW, latent: model.exotherm });
    this.column.wallsC = wallsC;
    this.column.onMelt = (node, stays) => this.meltLayers(node, stays);
    this.forcing = new Forcing(model.surroundings, duties, model.layers.beginS);
  }

  /**
   * Lays the next layer and runs its time.
   *
   * @param watch is called after every step, while the layer is the column's top node
   */
  layer(watch?: Watch): void {
    const { column, next: p, results } = this;
    const { layers, coarsen: coarsens } = this.model;
    if (p >= layers.count) return;
    if (p > 0 && layers.object[p] !== layers.object[p - 1])
      this.finishObject(layers.beginS[layers.count - 1] - layers.beginS[p]);
    const top = column.count - 1;
    const depositC = layers.depositC[p];
    clearResults(results, p);
    column.bedC = layers.bedC[p];
    results.contactC[p] = (depositC + (top < 0 ? column.bedC : column.tempC[top])) / 2;
    if (top >= 0) column.highestC[top] = column.tempC[top];
    column.add({
      layer: p,
      areaM2: layers.areaM2[p],
      heightM: layers.heightM[p],
      outlineM: layers.outlineM[p],
      tempC: depositC,
      airC: layers.airC[p],
    });
    const printedS = layers.timeS[p] + layers.waitS[p];
    this.runTop({ p, fromS: 0, timeS: printedS, watch });
    if (layers.pauseS[p] > 0)
      this.runTop({ p, fromS: printedS, timeS: layers.pauseS[p], override: layers.idleDuty, watch });
    const now = column.count - 1;
    results.interlayerC[p] = column.tempC[now];
    results.relativeWhenCovered[p] = column.relative[now];
    this.next = p + 1;
    if (coarsens) {
      lookAtFaces(column, printedS + layers.pauseS[p]);
      coarsen(column, this.tell);
    }
  }

  /** Lays all layers that are left, and cools. */
  run(): LayerResults {
    while (this.next < this.model.layers.count) this.layer();
    this.finish();
    return this.results;
  }

  /** The print has ended: fans and lamps off, the bed left to itself, until nothing changes any more. */
  finish(): void {
    const bedC = this.column.bedC;
    const { roomAirC } = this.model.surroundings;
    let coolingS = 0;
    this.cool((dtS) => {
      this.forcing.advance(dtS, "off");
      this.force(this.forcing);
      coolingS += dtS;
      this.column.bedC = roomAirC + (bedC - roomAirC) * Math.exp(-(coolingS - dtS / 2) / BED_TAU_S);
    });
  }

  /** Relative crystallinity of a layer as it is now, 0-1. */
  relative(position: number): number {
    const { column, results } = this;
    let node = column.count - 1;
    while (node >= 0 && column.firstLayer[node] > position) node--;
    const gained = node >= 0 && position < column.firstLayer[node] + column.layers[node] ? column.gained[node] : 0;
    return relativeCrystallinity(results.integral[position] + gained, column.avramiN);
  }

  /** @param into an earlier one, whose memory is used again */
  save(into?: SavedMarch): SavedMarch {
    const { next, results } = this;
    const length = RESULT_NAMES.length * next;
    const numbers = into !== undefined && into.results.length >= length ? into.results : new Float64Array(length + 512);
    RESULT_NAMES.forEach((name, r) => {
      numbers.set(results[name].subarray(0, next), r * next);
    });
    return { next, column: this.column.save(into?.column), forcing: this.forcing.save(), results: numbers };
  }

  restore({ next, column, forcing, results }: SavedMarch): void {
    this.next = next;
    this.column.restore(column);
    this.forcing.restore(forcing);
    RESULT_NAMES.forEach((name, r) => {
      this.results[name].set(results.subarray(r * next, (r + 1) * next));
    });
  }

  private force(means: Pick<Forcing, "hWM2K" | "topFluxWM2" | "sideFluxWM2" | "airRiseC">): void {
    const { column } = this;
    column.hWM2K = means.hWM2K;
    column.topFluxWM2 = means.topFluxWM2;
    column.sideFluxWM2 = means.sideFluxWM2;
    column.airRiseC = means.airRiseC;
  }

  /** Time goes on while layer p is the top. */
  private runTop({ p, fromS, timeS, override, watch }: Stretch): void {
    const { column, forcing, model } = this;
    const { material, layers } = model;
    const top = column.count - 1;
    const steps = layerSteps(timeS, layers.heightM[p], material);
    // Far below, where a layer's heat does not reach within its time, one step is enough for all of it.
    const first = model.coarsen ? column.nodeBelow(reachInLayers(timeS, layers.heightM[p], material)) : 0;
    const mean = { hWM2K: 0, topFluxWM2: 0, sideFluxWM2: 0, airRiseC: 0 };
    let passedUpJ = 0;
    let nowS = fromS;
    for (let s = 0, dtS = steps.firstS; s < steps.count; s++, dtS *= steps.growth) {
      const beforeC = column.tempC[top];
      const beforeShare = column.relative[top];
      forcing.advance(dtS, override);
      this.force(forcing);
      stepColumn(column, dtS, first);
      passedUpJ += column.fromBelowJ;
      mean.hWM2K += (forcing.hWM2K * dtS) / timeS;
      mean.topFluxWM2 += (forcing.topFluxWM2 * dtS) / timeS;
      mean.sideFluxWM2 += (forcing.sideFluxWM2 * dtS) / timeS;
      mean.airRiseC += (forcing.airRiseC * dtS) / timeS;
      if (Number.isNaN(this.results.timeToSolidS[p])) {
        const share = solidShare(material, beforeC, column.tempC[top], beforeShare, column.relative[top]);
        if (share <= 1) this.results.timeToSolidS[p] = nowS + share * dtS;
      }
      watch?.(dtS, column, column.tempC[top] - beforeC, column.latentJ[top] * (column.relative[top] - beforeShare));
      nowS += dtS;
    }
    if (first === 0 || !(timeS > 0)) return;
    this.force(mean);
    stepDeep(column, timeS, first, passedUpJ);
  }

  /** An object is complete: it cools while the others are printed on the same bed, which is switched off after them. */
  private finishObject(restS: number): void {
    const { column, model, forcing } = this;
    const { roomAirC, h0WM2K } = model.surroundings;
    const bedC = column.bedC;
    let coolingS = 0;
    this.cool((dtS) => {
      column.hWM2K = h0WM2K;
      column.topFluxWM2 = 0;
      column.sideFluxWM2 = 0;
      column.airRiseC = forcing.airRiseC;
      coolingS += dtS;
      const offS = Math.max(0, coolingS - dtS / 2 - restS);
      column.bedC = roomAirC + (bedC - roomAirC) * Math.exp(-offS / BED_TAU_S);
    }, restS);
    column.clear();
  }

  private cool(advance: (dtS: number) => void, heatedS = 0): void {
    const { column, model, results } = this;
    if (column.count === 0) return;
    const coldC = Math.max(model.material.tgC - COOL_BELOW_TG_C, COLD_C);
    let nowS = 0;
    for (const dtS of coolingSteps(model.layers.heightM[this.next - 1], model.material, heatedS + MOST_COOLING_S)) {
      if (nowS >= heatedS && this.warmestC() < coldC) break;
      advance(dtS);
      stepColumn(column, dtS);
      lookAtFaces(column, dtS);
      nowS += dtS;
    }
    for (let node = 0; node < column.count; node++) this.tellLayers(node);
    results.highestReheatC[this.next - 1] = Number.NaN;
    const { attainable = 0 } = model.material.kinetics ?? {};
    const first = column.firstLayer[0];
    for (let p = first; p < this.next; p++)
      results.crystallinity[p] = attainable * relativeCrystallinity(results.integral[p], column.avramiN);
  }

  private warmestC(): number {
    const { column } = this;
    let warmest = column.bedC;
    for (let i = 0; i < column.count; i++) if (column.tempC[i] > warmest) warmest = column.tempC[i];
    return warmest;
  }

  /** Hands what a node has gone through to its layers. */
  private tellLayers(node: number): void {
    const { column, results } = this;
    const first = column.firstLayer[node];
    const count = column.layers[node];
    const [gained, aboveTgS, highestC] = [column.gained[node], column.aboveTgS[node], column.highestC[node]];
    for (let m = 0; m < count; m++) {
      const p = first + m;
      const place = (m + 0.5) / count;
      const alone = count === 1;
      results.integral[p] += alone ? gained : within(column.lowGained[node], gained, column.highGained[node], place);
      results.timeAboveTgS[p] += alone
        ? aboveTgS
        : within(column.lowAboveS[node], aboveTgS, column.highAboveS[node], place);
      if (highestC > Number.NEGATIVE_INFINITY && !(results.highestReheatC[p] >= highestC))
        results.highestReheatC[p] = highestC;
    }
    column.forget(node);
  }

  private meltLayers(node: number, stays: number): void {
    this.tellLayers(node);
    const { column, results } = this;
    const first = column.firstLayer[node];
    for (let p = first; p < first + column.layers[node]; p++) {
      const relative = relativeCrystallinity(results.integral[p], column.avramiN) * stays;
      results.integral[p] = integralOf(relative, column.avramiN);
    }
  }
}

/**
 * The share of a step after which a layer holds its shape: cold enough, or crystalline enough. Above 1: not in this step.
 */
function solidShare(
  { solidBelowC, solidAtRelativeCrystallinity: solidAt }: Material,
  beforeC: number,
  afterC: number,
  beforeShare: number,
  afterShare: number,
): number {
  let share = Number.POSITIVE_INFINITY;
  if (beforeC <= solidBelowC) share = 0;
  else if (afterC <= solidBelowC) share = (beforeC - solidBelowC) / (beforeC - afterC);
  if (solidAt === null) return share;
  if (beforeShare >= solidAt) return 0;
  if (afterShare >= solidAt) share = Math.min(share, (solidAt - beforeShare) / (afterShare - beforeShare));
  return share;
}
