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
  return resolved(place).flatMap(({ pattern, name }) => (hasWords(pattern) ? wordsOf(pattern).replace("{}", name) : []));
}

/** The same as a sentence's beginning: `Zone base, heating lamp, duty`. */
export function placeText(place: Place): string {
  const words = placeWords(place);
  if (words.length === 0) return place.length === 0 ? "The document" : lastName(place);
  return words.map((word, position) => (position === 0 ? word : lowered(word))).join(", ");
}

/** Unit of the number at a place; undefined where it has none. */
export function placeUnit(place: Place): string | undefined {
  return resolved(place)
    .map(({ pattern }) => unitOf(pattern))
    .findLast((unit) => unit !== undefined);
}

interface Resolved {
  /** key of the table of words */
  pattern: string;
  /** what `*` stands for */
  name: string;
}

function resolved(place: Place): Resolved[] {
  let pattern = "";
  return place.map((step) => {
    const name = "field" in step ? step.field : step.entry;
    const own = pattern === "" ? name : `${pattern}.${name}`;
    const any = `${pattern}.*`;
    // Channels are keys in some parts of a document and entries in others.
    pattern = "field" in step && (hasWords(own) || !hasWords(any)) ? own : any;
    return { pattern, name };
  });
}

const lastName = (place: Place): string => {
  const step = place[place.length - 1];
  return "field" in step ? step.field : step.entry;
};

/** `Heating lamp` -> `heating lamp`; `Tg`, `E` and `G90` stay. */
const lowered = (word: string): string => (/^[A-Z][a-z]/.test(word) ? word[0].toLowerCase() + word.slice(1) : word);
