import type { Machine } from "#shared/formats/machine.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { linesOf, renumbered, sealed } from "#tests/shared/prove/plain-tuning.ts";
import { bytesOf, readBytes } from "#tests/shared/prove/proving.ts";

/** One way of tampering with a tuned file. */
export interface Tampering {
  name: string;
  tuned: string;
}

const FOREIGN = ["M106 S255", "M106 P2 S100 ;ql", "G1 X1", "G4 P100", "M104 S0", "M107", "; a comment", "", "T0"];

/**
 * Every single-line tampering with a text: in every line each digit changed, the line dropped, doubled, changed places
 * with the next, and foreign lines put in before it; in our own lines other duties, tags and blanks besides.
 */
export function tamperings(tuned: string, numbered: boolean): Tampering[] {
  const lines = linesOf(tuned);
  const newline = /[\r\n]+$/.exec(lines[0])?.[0] ?? "\n";
  const found: Tampering[] = [];
  const add = (name: string, k: number, changed: readonly string[]): void => {
    const text = changed.join("");
    if (text !== tuned) found.push({ name: `${name} at line ${k + 1}`, tuned: text });
  };
  const replaced = (k: number, ...by: string[]): string[] => [...lines.slice(0, k), ...by, ...lines.slice(k + 1)];
  for (const [k, line] of lines.entries()) {
    for (const { index } of line.matchAll(/\d/g)) {
      const digit = String((Number(line[index]) + 1) % 10);
      add(`digit ${index + 1} changed`, k, replaced(k, line.slice(0, index) + digit + line.slice(index + 1)));
    }
    add("dropped", k, replaced(k));
    add("doubled", k, replaced(k, line, line));
    if (k + 1 < lines.length)
      add("changed places", k, [...lines.slice(0, k), lines[k + 1], line, ...lines.slice(k + 2)]);
    add("a blank added", k, replaced(k, line.replace(/(?=[\r\n]*$)/, " ")));
    add(
      "another line end",
      k,
      replaced(
        k,
        line.replace(/[\r\n]*$/, (end) => (end === "\r" ? "\n" : "\r")),
      ),
    );
    for (const foreign of FOREIGN) {
      add(`"${foreign}" put in`, k, replaced(k, foreign + newline, line));
      if (numbered)
        add(`"${foreign}" put in with a number`, k, renumbered(replaced(k, `N0 ${foreign}*0${newline}`, line)));
    }
    if (!/;ql[+=]?[\r\n]*$/.test(line)) continue;
    add("untagged", k, replaced(k, line.replace(/ ;ql[+=]?/, "")));
    for (const tag of [";ql", ";ql+", ";ql=", ";qm", "; ql", ";ql "])
      add(`tagged ${tag}`, k, replaced(k, line.replace(/;ql[+=]?/, tag)));
    for (const duty of ["0", "1", "255", "999", "0128", "12.5", "-1"])
      add(`set to ${duty}`, k, replaced(k, line.replace(/(?<=[S=])[\d.]+(?=[ *])/, duty)));
    add("given another word", k, replaced(k, line.replace(/(?= ;ql)/, " F100")));
    add("in lower case", k, replaced(k, line.toLowerCase()));
  }
  return found;
}

/**
 * Tampering with our own lines by someone who knows the seal: every line of ours dropped, set to another duty or moved
 * over the next laying move, and numbers, counts and seal made to fit again.
 */
export function resealedTamperings(original: string, tuned: string, machine: Machine, profile: Profile): Tampering[] {
  const reading = readBytes(bytesOf(original), machine);
  const lines = linesOf(tuned);
  const found: Tampering[] = [];
  const add = (name: string, k: number, changed: readonly string[]): void => {
    const numbers = reading.file.numbered ? renumbered(changed) : changed;
    const text = sealed(numbers, reading, machine, profile).join("");
    if (text !== tuned) found.push({ name: `${name} at line ${k + 1}, sealed again`, tuned: text });
  };
  for (const [k, line] of lines.entries()) {
    if (!/;ql[+=]?[\r\n]*$/.test(line)) continue;
    const [before, behind] = [lines.slice(0, k), lines.slice(k + 1)];
    add("dropped", k, [...before, ...behind]);
    for (const duty of line.includes("VALUE=") || line.includes("SPEED=") ? ["0.05", "0.5", "1"] : ["7", "121", "255"])
      add(`set to ${duty}`, k, [...before, line.replace(/(?<=[S=])[\d.]+(?=[ *])/, duty), ...behind]);
    // Where nothing moves between two places, a line may stand at either.
    const lays = (other: string | undefined): boolean => other !== undefined && /G1 .*E/.test(other);
    const down = behind.findIndex(lays);
    const up = before.length - 1 - [...before].reverse().findIndex(lays);
    if (down >= 0) add("moved down", k, [...before, ...behind.slice(0, down + 1), line, ...behind.slice(down + 1)]);
    if (up < before.length) add("moved up", k, [...before.slice(0, up), line, ...before.slice(up), ...behind]);
  }
  return found;
}

/** Every character of the provenance line changed, one at a time. */
export function provenanceTamperings(tuned: string): Tampering[] {
  const start = tuned.indexOf(";quenchline {");
  const end = start + /^[^\r\n]*/.exec(tuned.slice(start))![0].length;
  return Array.from({ length: end - start }, (_, k) => {
    const at = start + k;
    const other = tuned[at] === "a" ? "b" : /[0-8]/.test(tuned[at]) ? String(Number(tuned[at]) + 1) : "a";
    return {
      name: `character ${k + 1} of the provenance line changed`,
      tuned: tuned.slice(0, at) + other + tuned.slice(at + 1),
    };
  });
}
