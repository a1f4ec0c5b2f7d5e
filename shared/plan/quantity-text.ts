/** Duties in thousandths, at least two decimals: "0.40", "0.425". Looked up, since a plan names tens of thousands. */
const THOUSANDTHS = Array.from({ length: 1001 }, (_, i) => (i / 1000).toFixed(3).replace(/0$/, ""));

/** A duty 0-1 as text, to the nearest thousandth. */
export function dutyText(duty: number): string {
  return THOUSANDTHS[Math.round(duty * 1000)] ?? String(duty);
}

/** A quantity >= 0 with one decimal where it has one, e.g. seconds: "7.2", "12". */
export function tenthsText(value: number): string {
  const tenths = Math.round(value * 10);
  if (!(tenths < 2 ** 31)) return String(value);
  const rest = tenths % 10;
  return rest === 0 ? `${tenths / 10}` : `${(tenths - rest) / 10}.${rest}`;
}

/** A height in whole micrometres as mm, as many decimals as it needs: "6.2". */
export function heightText(heightUm: number): string {
  return `${heightUm / 1000}`;
}

/** Two to four decimals for a number that someone typed into a document: "0.40", "0.125". */
export function givenText(value: number): string {
  return value.toFixed(4).replace(/0{1,2}$/, "");
}
