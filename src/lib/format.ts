const MINUS = "\u2212";
/** As wide as a digit where every sign is: keeps decimal points one under the other. */
const BLANK = "\u00a0";

/** A number with a fixed count of decimals; decimals line up wherever these are right-aligned. */
export function fixed(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return "–";
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? MINUS + text : text;
}

/** A number without trailing zeros, padded so that its decimal point stands where `fixed` would put it. */
export function trimmed(value: number, decimals: number): string {
  const text = fixed(value, decimals);
  if (decimals === 0) return text;
  const short = text.replace(/\.?0+$/, "");
  return short + BLANK.repeat(text.length - short.length);
}

/** A span of time as a person would say it: 7.4 s, 4 min 12 s, 3 h 04 min. */
export function duration(seconds: number): string {
  if (seconds < 60) return `${fixed(seconds, 1)} s`;
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
