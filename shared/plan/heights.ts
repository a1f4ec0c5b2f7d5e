/** Heights are compared in whole micrometres, so that 6.000000000001 mm lies on a border at 6 mm. */
export function micrometres(mm: number): number {
  return Math.round(mm * 1000);
}
