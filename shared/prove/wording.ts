import { countText } from "#shared/units/words.ts";

/** `1 line`, `12 lines`, `46 732 lines`. */
export function counted(count: number, one: string, several = `${one}s`): string {
  return `${countText(count)} ${count === 1 ? one : several}`;
}

/** A duty 0-1 to the nearest thousandth: `0.62`. */
export function dutyWords(duty: number): string {
  return Number.isNaN(duty) ? "an unknown duty" : String(Math.round(duty * 1000) / 1000);
}

/** `part-fan and lamp`. */
export function listed(names: readonly string[]): string {
  return names.length < 2 ? names.join("") : `${names.slice(0, -1).join(", ")} and ${names[names.length - 1]}`;
}
