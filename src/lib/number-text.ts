/** A number with a fixed count of decimals and a true minus sign, so that columns align on the decimal point. */
export function fixedText(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return "–";
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? text.replace("-", "") : text.replace("-", "\u2212");
}
