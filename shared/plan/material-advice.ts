import type { Polymer } from "#shared/formats/polymer.ts";
import type { Advice, PlanLayer } from "#shared/plan/plan.ts";

/**
 * Whether the file was sliced for this polymer, as far as its nozzle tells: nothing is laid below its melting
 * temperature, nor, where nothing of it crystallises, below its glass transition.
 */
export function materialAdvice(layers: readonly PlanLayer[], polymer: Polymer): Advice[] {
  const known = layers.filter(({ nozzleC }) => nozzleC !== undefined);
  if (known.length === 0) return [];
  const set = known.filter(({ nozzleC }) => nozzleC !== null && nozzleC! > 0);
  if (set.length === 0)
    return [
      {
        layer: known[0].index,
        code: "nozzle-unknown",
        message: `The file does not say how hot the nozzle is, so whether it was sliced for ${polymer.name} can't be seen.`,
      },
    ];
  const limitC = polymer.tmC?.value ?? polymer.tgC.value;
  const cold = set.find(({ nozzleC }) => nozzleC! < limitC);
  if (!cold) return [];
  const what = polymer.tmC === undefined ? "glass transition" : "melting temperature";
  return [
    {
      layer: cold.index,
      code: "nozzle-below-melting",
      message: `The nozzle is at ${cold.nozzleC} °C, below the ${what} of ${polymer.name}, ${limitC} °C: this file was not sliced for ${polymer.name}. Slice the part again, or choose a profile for what is printed.`,
    },
  ];
}
