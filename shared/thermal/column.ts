import { GrowthTable, integralOf } from "#shared/crystallinity/avrami.ts";
import { RateTable } from "#shared/crystallinity/rate.ts";
import type { Material } from "#shared/polymers/material.ts";
import { StepWork } from "#shared/thermal/step-work.ts";

/** A layer as it is laid on a column. */
export interface Slice {
  /** in the part, from 0; results are kept under it */
  layer: number;
  areaM2: number;
  heightM: number;
  outlineM: number;
  tempC: number;
  /** of the air at its height, before the lamps have warmed it */
  airC: number;
}

/** Heat that has gone in or out of a column since it was begun, J. Content is counted from 0 °C. */
export interface Heat {
  depositedJ: number;
  fromBedJ: number;
  fromLampJ: number;
  fromCrystallisingJ: number;
  toAirJ: number;
  radiatedJ: number;
}

export interface ColumnOptions {
  /** contact resistance between bed and first layer; Infinity: no bed, m²·K/W */
  bedContactM2KW: number;
  /** crystallising warms, and melting cools */
  latent: boolean;
}

/** What a column remembers of itself beside its nodes: bed link and contact, bed, booked heat. */
const SCALARS = 10;

/** Fewer nodes than this are not worth a step of their own. */
const FEW_NODES = 4;

/** A column as it was: copies of its numbers. */
export interface SavedColumn {
  count: number;
  numbers: Float64Array;
}

/**
 * A part as a stack of nodes, from the bed up: one for every layer, or for a block of layers that lie deep inside.
 *
 *        top: convection, radiation, lamp (all of it for the topmost node, a ledge's share below)
 *      ┌───────┐
 *      │ n - 1 │ side: convection, radiation, lamp at its side share
 *      ├───────┤ link: conduction through the overlap of the two areas, half a height each way
 *      │   …   │
 *      ├───────┤
 *      │   0   │
 *      └───────┘ bed link: contact resistance and half a height
 *
 * All quantities are absolute (J/K, W/K, m²), so areas may differ from layer to layer. Undersides that hang over are
 * taken as covered. `stepColumn` moves it on in time.
 */
export class Column {
  count = 0;
  /** °C */
  tempC!: Float64Array;
  /** J/K */
  capacityJK!: Float64Array;
  /** exposed sides and ledges, m² */
  sideM2!: Float64Array;
  topM2!: Float64Array;
  airC!: Float64Array;
  /** from the node's middle to its lower and upper face, K/W */
  downKW!: Float64Array;
  upKW!: Float64Array;
  /** to the node above, W/K */
  linkWK!: Float64Array;
  /** heat of crystallising all that can crystallise, J */
  latentJ!: Float64Array;
  /** state of crystallisation: the integral of the rate, and the relative crystallinity that belongs to it */
  integral!: Float64Array;
  relative!: Float64Array;
  /** since the node's layers were last told: integral gained, time above Tg, highest temperature */
  gained!: Float64Array;
  aboveTgS!: Float64Array;
  highestC!: Float64Array;
  /** of the upper face when it was last looked at, °C; and what was gained at both faces, as above */
  faceC!: Float64Array;
  lowGained!: Float64Array;
  highGained!: Float64Array;
  lowAboveS!: Float64Array;
  highAboveS!: Float64Array;
  /** layers of the node: the lowest, and how many */
  firstLayer!: Float64Array;
  layers!: Float64Array;
  /** area of the node's upper face, m² */
  faceM2!: Float64Array;

  bedLinkWK = 0;
  private bedContactKW = 0;
  bedC = 0;
  /** set before every step */
  hWM2K = 0;
  topFluxWM2 = 0;
  sideFluxWM2 = 0;
  airRiseC = 0;
  /** null: what the part radiates to is as warm as the air */
  wallsC: number | null = null;

  readonly heat: Heat = {
    depositedJ: 0,
    fromBedJ: 0,
    fromLampJ: 0,
    fromCrystallisingJ: 0,
    toAirJ: 0,
    radiatedJ: 0,
  };
  /** into the highest node that is moved, W: see `stepDeep` */
  fromAboveW = 0;
  /** what came in the last step from below the lowest node that was moved, J */
  fromBelowJ = 0;
  /** what the topmost node took from below, gave to the air and radiated in the last step, J */
  topFromBelowJ = 0;
  topToAirJ = 0;
  topRadiatedJ = 0;
  /** called before a node's crystals melt in part or whole, with the share that stays */
  onMelt: (node: number, stays: number) => void = () => {};

  readonly material: Material;
  readonly options: ColumnOptions;
  readonly rates: RateTable | null;
  readonly latent: boolean;
  readonly avramiN: number;
  readonly growth: GrowthTable;
  work!: StepWork;
  private fields: Float64Array[] = [];
  private capacity = 0;

  constructor(material: Material, options: ColumnOptions) {
    this.material = material;
    this.options = options;
    this.rates = material.kinetics === null ? null : new RateTable(material.kinetics);
    this.latent = options.latent && material.kinetics !== null;
    this.avramiN = material.kinetics?.avramiN ?? 1;
    this.growth = new GrowthTable(this.avramiN);
    this.grow(64);
  }

  /** Forgets all nodes; what has been booked stays. */
  clear(): void {
    this.count = 0;
  }

  /** Lays a layer on the top. */
  add({ layer, areaM2, heightM, outlineM, tempC, airC }: Slice): void {
    if (this.count === this.capacity) this.grow(2 * this.capacity);
    const { densityKgM3, heatCapacityJKgK, conductivityWMK, kinetics } = this.material;
    const i = this.count++;
    const massKg = densityKgM3 * areaM2 * heightM;
    const ownKW = heightM / 2 / (conductivityWMK * areaM2);
    this.tempC[i] = tempC;
    this.capacityJK[i] = massKg * heatCapacityJKgK;
    this.sideM2[i] = outlineM * heightM;
    this.topM2[i] = areaM2;
    this.faceM2[i] = areaM2;
    this.airC[i] = airC;
    this.downKW[i] = ownKW;
    this.upKW[i] = ownKW;
    this.linkWK[i] = 0;
    this.latentJ[i] = kinetics === null ? 0 : massKg * kinetics.heatOfFusionJKg * kinetics.attainable;
    this.integral[i] = 0;
    this.relative[i] = 0;
    this.faceC[i] = tempC;
    this.forget(i);
    this.firstLayer[i] = layer;
    this.layers[i] = 1;
    this.heat.depositedJ += this.capacityJK[i] * tempC;
    if (i > 0) this.cover(i - 1);
    else {
      this.bedContactKW = this.options.bedContactM2KW / areaM2;
      this.bedLinkWK = 1 / (this.bedContactKW + ownKW);
    }
  }

  /** Conduction between a node and the new one on it goes through the area that both have. */
  private cover(below: number): void {
    const above = below + 1;
    const overlapM2 = Math.min(this.faceM2[below], this.faceM2[above]);
    this.topM2[below] -= overlapM2;
    this.upKW[below] *= this.faceM2[below] / overlapM2;
    this.downKW[above] *= this.faceM2[above] / overlapM2;
    this.linkWK[below] = 1 / (this.upKW[below] + this.downKW[above]);
  }

  /** The lowest node of those that hold the topmost layers; 0 where only a few lie below. */
  nodeBelow(layers: number): number {
    let node = this.count - 1;
    for (let held = this.layers[node]; held < layers && node > 0; node--) held += this.layers[node - 1];
    return node < FEW_NODES ? 0 : node;
  }

  /** Cuts the lowest node off; where it was, no heat passes. */
  dropLowest(): void {
    for (const field of this.fields) field.copyWithin(0, 1, this.count);
    this.count--;
    this.bedLinkWK = 0;
  }

  /** Makes one node of a node and the one above it; heat and crystals are kept. Their layers must have been told. */
  merge(lower: number): void {
    const upper = lower + 1;
    const { capacityJK } = this;
    const mean = (of: Float64Array) =>
      (of[lower] * capacityJK[lower] + of[upper] * capacityJK[upper]) / (capacityJK[lower] + capacityJK[upper]);
    const throughKW = this.downKW[lower] + this.upKW[lower] + this.downKW[upper] + this.upKW[upper];
    this.tempC[lower] = mean(this.tempC);
    this.airC[lower] = mean(this.airC);
    this.relative[lower] = mean(this.relative);
    this.integral[lower] = integralOf(this.relative[lower], this.avramiN);
    for (const sum of [this.sideM2, this.topM2, this.latentJ, this.layers, capacityJK]) sum[lower] += sum[upper];
    this.faceM2[lower] = this.faceM2[upper];
    this.faceC[lower] = this.faceC[upper];
    this.downKW[lower] = throughKW / 2;
    this.upKW[lower] = throughKW / 2;
    for (const field of this.fields) field.copyWithin(upper, upper + 1, this.count);
    this.count--;
    if (lower > 0) this.linkWK[lower - 1] = 1 / (this.upKW[lower - 1] + this.downKW[lower]);
    else this.bedLinkWK = 1 / (this.bedContactKW + this.downKW[0]);
    this.linkWK[lower] = upper < this.count ? 1 / (this.upKW[lower] + this.downKW[upper]) : 0;
  }

  /** What the node's layers have been told is gathered anew. */
  forget(node: number): void {
    this.gained[node] = 0;
    this.aboveTgS[node] = 0;
    this.lowGained[node] = 0;
    this.highGained[node] = 0;
    this.lowAboveS[node] = 0;
    this.highAboveS[node] = 0;
    this.highestC[node] = Number.NEGATIVE_INFINITY;
  }

  /** Keeps this share of a node's crystals. */
  keepCrystals(node: number, stays: number): void {
    this.relative[node] *= stays;
    this.integral[node] = integralOf(this.relative[node], this.avramiN);
  }

  /** Heat in all nodes, counted from 0 °C, J. */
  contentJ(): number {
    let sum = 0;
    for (let i = 0; i < this.count; i++) sum += this.capacityJK[i] * this.tempC[i];
    return sum;
  }

  /** @param into an earlier one, whose memory is used again */
  save(into?: SavedColumn): SavedColumn {
    const { count, fields, heat } = this;
    const length = SCALARS + fields.length * count;
    const numbers = into !== undefined && into.numbers.length >= length ? into.numbers : new Float64Array(length + 512);
    const scalars = [this.bedLinkWK, this.bedContactKW, this.bedC, this.airRiseC, ...Object.values(heat)];
    numbers.set(scalars);
    for (let f = 0; f < fields.length; f++) numbers.set(fields[f].subarray(0, count), SCALARS + f * count);
    return { count, numbers };
  }

  restore({ count, numbers }: SavedColumn): void {
    while (this.capacity < count) this.grow(2 * this.capacity);
    const { fields, heat } = this;
    this.count = count;
    [this.bedLinkWK, this.bedContactKW, this.bedC, this.airRiseC] = numbers;
    [heat.depositedJ, heat.fromBedJ, heat.fromLampJ] = numbers.subarray(4, 7);
    [heat.fromCrystallisingJ, heat.toAirJ, heat.radiatedJ] = numbers.subarray(7, 10);
    for (let f = 0; f < fields.length; f++) {
      const from = SCALARS + f * count;
      fields[f].set(numbers.subarray(from, from + count));
    }
  }

  private grow(capacity: number): void {
    const larger = (old?: Float64Array) => {
      const array = new Float64Array(capacity);
      if (old !== undefined) array.set(old);
      return array;
    };
    this.capacity = capacity;
    this.tempC = larger(this.tempC);
    this.capacityJK = larger(this.capacityJK);
    this.sideM2 = larger(this.sideM2);
    this.topM2 = larger(this.topM2);
    this.faceM2 = larger(this.faceM2);
    this.airC = larger(this.airC);
    this.downKW = larger(this.downKW);
    this.upKW = larger(this.upKW);
    this.linkWK = larger(this.linkWK);
    this.latentJ = larger(this.latentJ);
    this.integral = larger(this.integral);
    this.relative = larger(this.relative);
    this.gained = larger(this.gained);
    this.aboveTgS = larger(this.aboveTgS);
    this.highestC = larger(this.highestC);
    this.faceC = larger(this.faceC);
    this.lowGained = larger(this.lowGained);
    this.highGained = larger(this.highGained);
    this.lowAboveS = larger(this.lowAboveS);
    this.highAboveS = larger(this.highAboveS);
    this.firstLayer = larger(this.firstLayer);
    this.layers = larger(this.layers);
    this.fields = [
      this.tempC,
      this.capacityJK,
      this.sideM2,
      this.topM2,
      this.faceM2,
      this.airC,
      this.downKW,
      this.upKW,
    ];
    this.fields.push(this.linkWK, this.latentJ, this.integral, this.relative, this.gained, this.aboveTgS);
    this.fields.push(this.highestC, this.firstLayer, this.layers, this.faceC);
    this.fields.push(this.lowGained, this.highGained, this.lowAboveS, this.highAboveS);
    this.work = new StepWork(capacity);
  }
}
