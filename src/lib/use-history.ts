import { useRef, useState } from "react";
import { type Past, recorded, redone, undone } from "#src/lib/history.ts";

export interface History<Value> {
  /**
   * Makes a change. Changes of one gesture, such as all that belong to one drag or to typing in one field, are undone
   * together.
   */
  edit(next: Value, gesture?: string): void;
  /** the next change begins a new step, even of the same gesture */
  rest(): void;
  undo(): void;
  redo(): void;
  canUndo: boolean;
  canRedo: boolean;
}

const EMPTY: Past<never> = { before: [], after: [] };

/** Undo and redo for a value that somebody else holds. A value that is set from outside begins a new history. */
export function useHistory<Value>(value: Value, onChange: (value: Value) => void): History<Value> {
  const [past, setPast] = useState<Past<Value>>(EMPTY);
  const present = useRef(value);
  const known = present.current === value ? past : EMPTY;

  const go = (step: { past: Past<Value>; value: Value } | undefined) => {
    if (!step) return;
    present.current = step.value;
    setPast(step.past);
    onChange(step.value);
  };
  return {
    edit: (next, gesture) => go({ past: recorded(known, value, gesture), value: next }),
    rest: () => setPast((old) => ({ ...old, gesture: undefined })),
    undo: () => go(undone(known, value)),
    redo: () => go(redone(known, value)),
    canUndo: known.before.length > 0,
    canRedo: known.after.length > 0,
  };
}
