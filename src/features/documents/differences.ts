import { entryName, type Place, type Step } from "#src/lib/place.ts";

/** What stands at a place: a text, a number, a choice, or a curve as a whole. */
export type Leaf = string | number | boolean | null | readonly unknown[];

/** One place in which two documents differ; a side without a value has nothing there. */
export interface Difference {
  place: Place;
  before?: Leaf;
  after?: Leaf;
}

/** Compares two documents place by place, in the order of the first and then of the second. */
export function differences(before: unknown, after: unknown): Difference[] {
  const [left, right] = [leaves(before), leaves(after)];
  const keys = [...new Set([...left.keys(), ...right.keys()])];
  return keys.flatMap((key) => {
    const [was, is] = [left.get(key), right.get(key)];
    if (was && is && JSON.stringify(was.value) === JSON.stringify(is.value)) return [];
    return { place: (was ?? is)?.place ?? [], before: was?.value, after: is?.value };
  });
}

interface Found {
  place: Place;
  value: Leaf;
}

function leaves(document: unknown): Map<string, Found> {
  const found = new Map<string, Found>();
  collect(document, [], found);
  return found;
}

function collect(value: unknown, place: Place, into: Map<string, Found>): void {
  if (Array.isArray(value)) collectList(value, place, into);
  else if (typeof value === "object" && value !== null) {
    for (const [field, part] of Object.entries(value)) collect(part, [...place, { field }], into);
  } else if (value !== undefined) into.set(JSON.stringify(place), { place, value: value as Leaf });
}

function collectList(list: unknown[], place: Place, into: Map<string, Found>): void {
  // The points of a curve say more together than one by one.
  if (list.length > 0 && list.every((entry) => typeof entry !== "object" || Array.isArray(entry))) {
    into.set(JSON.stringify(place), { place, value: list });
    return;
  }
  const seen = new Map<string, number>();
  list.forEach((entry, position) => {
    const name = entryName(entry) ?? String(position + 1);
    const times = (seen.get(name) ?? 0) + 1;
    seen.set(name, times);
    const step: Step = { entry: times > 1 ? `${name} ${times}` : name };
    collect(entry, [...place, step], into);
  });
}
