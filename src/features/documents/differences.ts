/** One place in which two documents differ; a side without a value has nothing there. */
export interface Difference {
  path: string;
  before?: string;
  after?: string;
}

/** What tells the entries of a list apart, so that an inserted zone or channel does not make all others differ. */
const KEYS = ["id", "name", "channel", "command"];

/** Compares two documents place by place, in the order of the first and then of the second. */
export function differences(before: unknown, after: unknown): Difference[] {
  const [left, right] = [leaves(before), leaves(after)];
  const paths = [...new Set([...left.keys(), ...right.keys()])];
  return paths
    .filter((path) => left.get(path) !== right.get(path))
    .map((path) => ({ path, before: left.get(path), after: right.get(path) }));
}

function leaves(document: unknown): Map<string, string> {
  const found = new Map<string, string>();
  collect(document, "", found);
  return found;
}

function collect(value: unknown, path: string, into: Map<string, string>): void {
  if (Array.isArray(value)) collectList(value, path, into);
  else if (typeof value === "object" && value !== null) {
    for (const [key, part] of Object.entries(value)) collect(part, path === "" ? key : `${path}.${key}`, into);
  } else if (value !== undefined) into.set(path, typeof value === "string" ? value : JSON.stringify(value));
}

function collectList(list: unknown[], path: string, into: Map<string, string>): void {
  // The points of a curve say more together than one by one.
  if (list.every((entry) => typeof entry !== "object" || Array.isArray(entry))) {
    into.set(path, JSON.stringify(list).replaceAll("],[", "] [").replaceAll(",", ", "));
    return;
  }
  const seen = new Map<string, number>();
  list.forEach((entry, position) => {
    const name = nameOf(entry) ?? String(position + 1);
    const times = (seen.get(name) ?? 0) + 1;
    seen.set(name, times);
    collect(entry, `${path}[${name}${times > 1 ? ` ${times}` : ""}]`, into);
  });
}

function nameOf(entry: unknown): string | undefined {
  if (typeof entry !== "object" || entry === null) return undefined;
  for (const key of KEYS) {
    const value: unknown = Reflect.get(entry, key);
    if (typeof value === "string") return value;
  }
  return undefined;
}
