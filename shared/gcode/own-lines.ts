/**
 * How our own lines are known again in a tuned file. A command of ours ends in a short tag; one provenance line says
 * where the file came from.
 */
export const PLAN_TAG = ";ql";
/** stands in the place of a command that brought a kept raise down again */
export const RESTORE_TAG = ";ql=";
export const PROVENANCE_PREFIX = ";quenchline ";

const matches = (buf: Uint8Array, start: number, end: number, text: string): boolean => {
  if (end - start !== text.length) return false;
  for (let k = 0; k < text.length; k++) if (buf[start + k] !== text.charCodeAt(k)) return false;
  return true;
};

/** Which tag a comment (delimiter excluded) is, if any. */
export function ownTag(buf: Uint8Array, commentStart: number, commentEnd: number): "plan" | "restore" | false {
  if (commentStart < 0) return false;
  if (matches(buf, commentStart, commentEnd, PLAN_TAG.slice(1))) return "plan";
  return matches(buf, commentStart, commentEnd, RESTORE_TAG.slice(1)) ? "restore" : false;
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
