/**
 * The candidate that a mistyped word most likely meant, or undefined when none is near: at most a third of its letters
 * (and at least two) may be wrong, missing or too many. Case is ignored.
 */
export function nearestSpelling(word: string, candidates: readonly string[]): string | undefined {
  let nearest: string | undefined;
  let fewest = Math.max(2, Math.floor(word.length / 3)) + 1;
  for (const candidate of candidates) {
    // A long word costs its length squared and cannot be near a short candidate anyway.
    if (Math.abs(candidate.length - word.length) >= fewest) continue;
    const edits = editDistance(word.toLowerCase(), candidate.toLowerCase());
    if (edits >= fewest || edits >= candidate.length) continue;
    nearest = candidate;
    fewest = edits;
  }
  return nearest;
}

/** Least number of single-letter insertions, deletions and replacements (Levenshtein 1966), one row at a time. */
function editDistance(from: string, to: string): number {
  let row = Array.from({ length: to.length + 1 }, (_, i) => i);
  for (let i = 1; i <= from.length; i++) {
    const next = [i];
    for (let j = 1; j <= to.length; j++) {
      const replaced = row[j - 1] + (from[i - 1] === to[j - 1] ? 0 : 1);
      next.push(Math.min(replaced, row[j] + 1, next[j - 1] + 1));
    }
    row = next;
  }
  return row[to.length];
}
