import { fixedText } from "#src/lib/number-text.ts";

/** As wide as a digit where every sign is: keeps decimal points one under the other. */
const BLANK = "\u00a0";

/** A number with its own count of decimals, padded as if it had `upTo`: for columns of unlike quantities. */
export function aligned(value: number, decimals: number, upTo: number): string {
  return fixedText(value, decimals) + BLANK.repeat(upTo - decimals + (decimals === 0 && upTo > 0 ? 1 : 0));
}

/** A span of time as a person would say it: 7.4 s, 4 min 12 s, 3 h 04 min. */
export function duration(seconds: number): string {
  if (seconds < 60) return `${fixedText(seconds, 1)} s`;
  const whole = Math.round(seconds);
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${two(whole % 60)} s`;
  const minutes = Math.round(seconds / 60);
  return `${Math.floor(minutes / 60)} h ${two(minutes % 60)} min`;
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

/** "1 layer", "45 layers" */
export function counted(count: number, noun: string): string {
  return `${count.toLocaleString("en").replaceAll(",", "\u202f")} ${noun}${count === 1 ? "" : "s"}`;
}

function two(value: number): string {
  return String(value).padStart(2, "0");
}
