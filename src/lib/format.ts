import { countText } from "#shared/units/words.ts";
import { fixedText } from "#src/lib/number-text.ts";

/** As wide as a digit where every sign is: keeps decimal points one under the other. */
const BLANK = "\u00a0";

/** A number with its own count of decimals, padded as if it had `upTo`: for columns of unlike quantities. */
export function aligned(value: number, decimals: number, upTo: number): string {
  return fixedText(value, decimals) + BLANK.repeat(upTo - decimals + (decimals === 0 && upTo > 0 ? 1 : 0));
}

/** Decimal units, as disks and slicers count. */
export function bytes(count: number): string {
  if (count < 1000) return `${count} B`;
  const units = ["kB", "MB", "GB", "TB"];
  let value = count / 1000;
  let unit = 0;
  while (value >= 999.5 && unit < units.length - 1) {
    value /= 1000;
    unit++;
  }
  return `${value < 9.995 ? value.toFixed(2) : value < 99.95 ? value.toFixed(1) : value.toFixed(0)} ${units[unit]}`;
}

/** Local date and time, largest unit first, so that a column of them sorts and aligns. */
export function moment(iso: string): string {
  const at = new Date(iso);
  if (Number.isNaN(at.getTime())) return "–";
  return `${at.getFullYear()}-${two(at.getMonth() + 1)}-${two(at.getDate())} ${two(at.getHours())}:${two(at.getMinutes())}`;
}

/** "1 layer", "45 layers", "46 732 lines"; without a noun only the number. Thousands stand apart by a thin space. */
export function counted(count: number, noun?: string): string {
  return noun === undefined ? countText(count) : `${countText(count)} ${noun}${count === 1 ? "" : "s"}`;
}

function two(value: number): string {
  return String(value).padStart(2, "0");
}
