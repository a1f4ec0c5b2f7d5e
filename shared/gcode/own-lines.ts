/**
 * How our own lines are known again in a tuned file. A command of ours ends in a short tag; one provenance line says
 * where the file came from.
 */
export const OWN_TAGS = { plan: ";ql", raise: ";ql+", restore: ";ql=" } as const;
/** `plan`: a duty of the plan; `raise`: a raise of the file, cut to a limit; `restore`: back to the plan after a raise */
export type OwnTag = keyof typeof OWN_TAGS;
export const PROVENANCE_PREFIX = ";quenchline ";

const matches = (buf: Uint8Array, start: number, end: number, text: string): boolean => {
  if (end - start !== text.length) return false;
  for (let k = 0; k < text.length; k++) if (buf[start + k] !== text.charCodeAt(k)) return false;
  return true;
};

/** Which tag a comment (delimiter excluded) is, if any. */
export function ownTag(buf: Uint8Array, commentStart: number, commentEnd: number): OwnTag | false {
  if (commentStart < 0 || commentEnd - commentStart > 3) return false;
  for (const tag of ["plan", "raise", "restore"] as const)
    if (matches(buf, commentStart, commentEnd, OWN_TAGS[tag].slice(1))) return tag;
  return false;
}

/** Whether a comment-only line is the provenance line. */
export function isProvenance(buf: Uint8Array, commentStart: number, commentEnd: number): boolean {
  const length = PROVENANCE_PREFIX.length - 1;
  return (
    commentStart >= 0 &&
    commentEnd - commentStart > length &&
    matches(buf, commentStart, commentStart + length, PROVENANCE_PREFIX.slice(1)) &&
    buf[commentStart + length] === 123
  );
}
