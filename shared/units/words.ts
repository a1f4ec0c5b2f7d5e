/** A count with its thousands apart by a narrow no-break space (ISO 80000-1): `46 732`. */
export function countText(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, "\u202f");
}

/** A span of time as a person would say it: `7.4 s`, `4 min 12 s`, `3 h 04 min`. */
export function durationText(timeS: number): string {
  const two = (part: number) => String(part).padStart(2, "0");
  if (timeS < 59.95) return `${timeS.toFixed(1)} s`;
  const whole = Math.round(timeS);
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${two(whole % 60)} s`;
  const minutes = Math.round(timeS / 60);
  return `${Math.floor(minutes / 60)} h ${two(minutes % 60)} min`;
}
