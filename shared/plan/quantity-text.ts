/** Duties in thousandths, at least two decimals: "0.40", "0.425". Looked up, since a plan names tens of thousands. */
const DUTIES = Array.from({ length: 1001 }, (_, i) => (i / 1000).toFixed(3).replace(/0$/, ""));

/** What follows the whole number for 0 to 999 thousandths: "", ".2", ".125". */
const DECIMALS = Array.from({ length: 1000 }, (_, i) => String(i / 1000).slice(1));

/** A duty 0-1 as text, to the nearest thousandth. */
export function dutyText(duty: number): string {
  return DUTIES[Math.round(duty * 1000)] ?? String(duty);
}

/** A quantity >= 0 with one decimal where it has one, e.g. seconds: "7.2", "12". */
export function tenthsText(value: number): string {
  return Number.isFinite(value) ? thousandthsText(Math.round(value * 10) * 100) : String(value);
}

/** A height in whole micrometres as mm, with as many decimals as it needs: "6.2". */
export function heightText(heightUm: number): string {
  return Number.isFinite(heightUm) && heightUm > 0 ? thousandthsText(heightUm) : "0";
}

function thousandthsText(thousandths: number): string {
  const rest = thousandths % 1000;
  return `${(thousandths - rest) / 1000}${DECIMALS[rest]}`;
}

/** A number that someone typed into a document, as it was typed but with at least two decimals: "0.40", "0.125". */
export function givenText(value: number): string {
  const short = value.toFixed(2);
  return Number(short) === value ? short : String(value);
}
