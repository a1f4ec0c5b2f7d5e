/** What a calorimeter found in one first heating run. */
export interface DscRun {
  /** melting endotherm, J/g of specimen, positive */
  meltingJG: number;
  /** magnitude of the cold-crystallisation exotherm of the same run; 0: none, J/g */
  coldCrystallisationJG: number;
  /** mass fraction of the polymer: 1 unfilled, 0.7 with 30 wt% of fibre */
  polymerShare: number;
  /** of the fully crystalline polymer; published values differ, so its source belongs beside the result, J/g */
  heatOfFusionJG: number;
}

/**
 * Mass fraction that was crystalline before the run: (ΔHm - ΔHcc) / (w · ΔH0).
 *
 * Adding heats that were measured at different temperatures is biased by a few per cent of crystallinity, and noise may
 * carry the result below 0, which is returned as it is.
 */
export function dscCrystallinity({ meltingJG, coldCrystallisationJG, polymerShare, heatOfFusionJG }: DscRun): number {
  return (meltingJG - coldCrystallisationJG) / (polymerShare * heatOfFusionJG);
}

/** Densities in any one unit. */
export interface Densities {
  measured: number;
  amorphous: number;
  crystal: number;
}

/** Crystallinity of an unfilled, void-free specimen from its density, as fractions of volume and of mass. */
export function densityCrystallinity({ measured, amorphous, crystal }: Densities): { volume: number; mass: number } {
  const volume = (measured - amorphous) / (crystal - amorphous);
  return { volume, mass: (volume * crystal) / measured };
}
