import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Layer } from "#shared/layers/reading.ts";
import { type Material, materialOf } from "#shared/polymers/material.ts";
import { type LayerTable, layerTable, type Note } from "#shared/prediction/layer-table.ts";
import { type End, type Surroundings, surroundingsOf } from "#shared/thermal/surroundings.ts";

/** What the prediction needs of a layer. */
export type PredictionLayer = Pick<
  Layer,
  "index" | "object" | "zMm" | "heightMm" | "timeS" | "areaMm2" | "outlineMm" | "nozzleC" | "bedC" | "waits"
>;

export interface ModelInput {
  /** in print order */
  layers: readonly PredictionLayer[];
  machine: Machine;
  polymer: Polymer;
  /** end of the uncertain inputs' ranges (default: typical) */
  end?: End;
  /** blocks of layers deep inside the part become one node (default); off, cost grows with the square of the layers */
  coarsen?: boolean;
  /** crystallising warms (default) */
  exotherm?: boolean;
}

/** All that a march through the layers needs and that no duty changes. */
export interface Model {
  material: Material;
  surroundings: Surroundings;
  layers: LayerTable;
  /** what had to be assumed of this part */
  notes: Note[];
  coarsen: boolean;
  exotherm: boolean;
}

/** @throws Refusal `half-times-unusable` where the card's half-times fit no bell */
export function makeModel({ layers, machine, polymer, end = "typical", ...options }: ModelInput): Model {
  const material = materialOf(polymer);
  const surroundings = surroundingsOf(machine, material, end);
  const { table, notes } = layerTable(layers, machine, material, surroundings);
  const { coarsen = true, exotherm = true } = options;
  return { material, surroundings, layers: table, notes, coarsen, exotherm };
}
