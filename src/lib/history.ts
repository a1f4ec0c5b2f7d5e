/** What a value was before, and what was taken back; the latest last in both. */
export interface Past<Value> {
  before: readonly Value[];
  after: readonly Value[];
  /** the gesture the latest change belongs to */
  gesture?: string;
}

/** More steps back than anyone takes. */
const MOST = 200;

/** The history once `value` is about to be changed. Further changes of the same gesture add no step. */
export function recorded<Value>(past: Past<Value>, value: Value, gesture?: string): Past<Value> {
  const goesOn = gesture !== undefined && gesture === past.gesture;
  return { before: goesOn ? past.before : [...past.before, value].slice(-MOST), after: [], gesture };
}

export function undone<Value>({ before, after }: Past<Value>, value: Value) {
  if (before.length === 0) return undefined;
  return { past: { before: before.slice(0, -1), after: [...after, value] }, value: before[before.length - 1] };
}

export function redone<Value>({ before, after }: Past<Value>, value: Value) {
  if (after.length === 0) return undefined;
  return { past: { before: [...before, value], after: after.slice(0, -1) }, value: after[after.length - 1] };
}
