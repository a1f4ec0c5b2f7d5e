/** Feed rates are written in mm/min; inside, speeds are mm/s. */
export function mmMinToMmS(feedMmMin: number): number {
  return feedMmMin / 60;
}

/** @param speedMmS speed, mm/s @returns feed rate, mm/min */
export function mmSToMmMin(speedMmS: number): number {
  return speedMmS * 60;
}
