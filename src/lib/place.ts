import { hasWords, unitOf, wordsOf } from "#src/lib/document-words.ts";

/** One step into a document: a field, or an entry of a list by what it is called. */
export type Step = { field: string } | { entry: string };
/** Where something stands in a document. */
export type Place = readonly Step[];

/** What tells the entries of a list apart, so that an inserted zone or channel does not make all others differ. */
const KEYS = ["id", "name", "channel", "command"];

/** What an entry of a list is called; undefined where it has no name. */
export function entryName(entry: unknown): string | undefined {
  if (typeof entry !== "object" || entry === null) return undefined;
  for (const key of KEYS) {
    const value: unknown = Reflect.get(entry, key);
    if (typeof value === "string" && value !== "") return value;
  }
  return undefined;
}

/**
 * Reads a path as messages give it.
 *
 * @param path e.g. `zones[0].cooling[1].duty`
 * @param document names the entries; without it they keep their numbers, counted from 1
 */
export function placeOf(path: string, document?: unknown): Place {
  let value = document;
  return [...path.matchAll(/\[(\d+)\]|\["((?:[^"\\]|\\.)*)"\]|([^.[\]]+)/g)].map(([, index, quoted, plain]): Step => {
    const key = index === undefined ? (quoted ?? plain) : Number(index);
    value = typeof value === "object" && value !== null ? Reflect.get(value, key) : undefined;
    return typeof key === "number" ? { entry: entryName(value) ?? String(key + 1) } : { field: key };
  });
}

/** A place in words, from the outermost in: `["Zone base", "Heating lamp", "duty"]`; empty for the document as a whole. */
export function placeWords(place: Place): string[] {
  const steps = resolved(place);
  return steps.flatMap(({ pattern, name }, position) => {
    const next = steps[position + 1]?.pattern;
    // "Heating lamp" says heating already.
    if (next === `${pattern}.*` && hasWords(next)) return [];
    if (hasWords(pattern)) return wordsOf(pattern).replace("{}", name);
    return COMMON.includes(name) ? name : [];
  });
}

/** The same as a sentence's beginning: `Zone base, heating lamp, duty`. */
export function placeText(place: Place): string {
  if (place.length === 0) return "The document";
  const words = placeWords(place);
  // What our documents don't know has no words: its own name has to do.
  if (words.length === 0) return nameOf(place[place.length - 1]);
  return words.map((word, position) => (position === 0 ? word : lowered(word))).join(", ");
}

/** Unit of the number at a place; undefined where it has none. */
export function placeUnit(place: Place): string | undefined {
  return resolved(place)
    .map(({ pattern }) => unitOf(pattern))
    .filter((unit) => unit !== undefined)
    .at(-1);
}

/** Parts of a document that belong together on its page. */
const GROUPS = ["zones.*", "channels.*", "pauses.*", "limits.*", "motion", "thermal", "margins", "crystallinity"];

/** The part of the document a place lies in, in words, and what remains; a place in no part has no group. */
export function grouped(place: Place): { group?: string; words: string } {
  const start = resolved(place).findIndex(({ pattern }) => GROUPS.includes(pattern));
  if (start < 0 || start === place.length - 1) return { words: placeText(place) };
  const [group, ...rest] = placeWords(place);
  const words = rest.length === 0 ? nameOf(place[place.length - 1]) : rest.map(lowered).join(", ");
  return { group, words: words[0].toUpperCase() + words.slice(1) };
}

/** Fields that mean the same wherever they stand. */
const COMMON = ["source", "confidence", "low", "typical", "high"];

interface Resolved {
  /** key of the table of words */
  pattern: string;
  /** what `*` stands for */
  name: string;
}

function resolved(place: Place): Resolved[] {
  let pattern = "";
  return place.map((step) => {
    const name = nameOf(step);
    const own = pattern === "" ? name : `${pattern}.${name}`;
    const any = `${pattern}.*`;
    // Channels are fields in some parts of a document and entries in others.
    pattern = "field" in step && (hasWords(own) || !hasWords(any)) ? own : any;
    return { pattern, name };
  });
}

const nameOf = (step: Step): string => ("field" in step ? step.field : step.entry);

/** `Heating lamp` -> `heating lamp`; `Tg`, `E` and `G90` stay. */
const lowered = (word: string): string => (/^[A-Z][a-z]/.test(word) ? word[0].toLowerCase() + word.slice(1) : word);
