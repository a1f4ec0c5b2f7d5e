import { useEffect, useRef, useState } from "react";

interface KeptDraft<Document> {
  /** number of the version the draft began from */
  basedOn: number;
  document: Document;
  at: string;
}

export interface Draft<Document> {
  document: Document;
  basedOn: number;
  /** differs from what it began from */
  changed: boolean;
  /** when it was last changed, if it comes from an earlier visit */
  resumedFrom?: string;
  change(document: Document): void;
  /** takes the draft on top of a newer version */
  rebase(basedOn: number): void;
  discard(): void;
}

const PREFIX = "quenchline.draft.";
/** Dragging a point changes a draft many times a second; storage hears of it when the hand rests. */
const REST_MS = 400;

/**
 * A document being edited. What has been typed is kept in this browser until it is saved or discarded, so that neither a
 * closed tab nor a lost network costs any of it.
 */
export function useDraft<Document>(key: string, base: { number: number; document: Document }): Draft<Document> {
  const [kept, setKept] = useState(() => readKept<Document>(key));
  const [resumedFrom, setResumedFrom] = useState(kept?.at);
  const pending = useRef<ReturnType<typeof setTimeout>>(undefined);
  const latest = useRef(kept);
  latest.current = kept;

  const keep = (next: KeptDraft<Document> | undefined) => {
    setKept(next);
    latest.current = next;
    clearTimeout(pending.current);
    pending.current = setTimeout(() => writeKept(key, latest.current), REST_MS);
  };
  // What has not been written down yet is, when the page is left.
  useEffect(
    () => () => {
      clearTimeout(pending.current);
      writeKept(key, latest.current);
    },
    [key],
  );

  return {
    document: kept?.document ?? base.document,
    basedOn: kept?.basedOn ?? base.number,
    changed: kept !== undefined,
    resumedFrom,
    change: (document) => keep({ basedOn: kept?.basedOn ?? base.number, document, at: new Date().toISOString() }),
    rebase: (basedOn) => kept && keep({ ...kept, basedOn }),
    discard: () => {
      setResumedFrom(undefined);
      keep(undefined);
      writeKept(key, undefined);
    },
  };
}

function readKept<Document>(key: string): KeptDraft<Document> | undefined {
  try {
    const text = localStorage.getItem(PREFIX + key);
    return text === null ? undefined : (JSON.parse(text) as KeptDraft<Document>);
  } catch {
    return undefined;
  }
}

function writeKept(key: string, draft: KeptDraft<unknown> | undefined): void {
  try {
    if (draft === undefined) localStorage.removeItem(PREFIX + key);
    else localStorage.setItem(PREFIX + key, JSON.stringify(draft));
  } catch {
    // Storage may be full or closed to us; the draft then lasts as long as the page.
  }
}
