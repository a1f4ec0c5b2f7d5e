import { obstacle } from "#server/cli/obstacle.ts";
import { countText } from "#shared/units/words.ts";

const UNPRINTABLE = /[\p{Cc}\p{Cs}\u202a-\u202e\u2066-\u2069]/gu;

/** Text from a file or a name must not steer the terminal: control characters are shown as escapes. */
export function printable(text: string): string {
  return text.replace(UNPRINTABLE, (mark) =>
    mark === "\n" ? mark : `\\u{${mark.codePointAt(0)!.toString(16).padStart(2, "0")}}`,
  );
}

/** Writes to standard error, where everything goes that is not the command's result. */
export function complain(text: string): void {
  process.stderr.write(printable(text));
}

/** Writes to standard output and waits until it is taken: a reader may be slow, and leaving would cut it short. */
export function print(text: string): Promise<void> {
  return new Promise((resolve, reject) => {
    process.stdout.write(text, (error) =>
      error ? reject(obstacle(error, "to standard output", "Make room, or send it elsewhere.")) : resolve(),
    );
  });
}

/** `1 line`, `12 345 lines` */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${countText(count)} ${count === 1 ? one : many}`;
}

/** Size with three digits, in units of 1000 as disks are sold. */
export function sizeText(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`;
  const units = ["kB", "MB", "GB"];
  let value = bytes / 1000;
  while (value >= 999.5 && units.length > 1) {
    value /= 1000;
    units.shift();
  }
  return `${value.toPrecision(3)} ${units[0]}`;
}
