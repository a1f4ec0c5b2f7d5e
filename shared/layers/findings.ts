import type { Finding } from "#shared/layers/reading.ts";

/** How many findings of one kind are kept with their lines; the rest are counted. */
const KEPT = 20;

/** What looks wrong in a file, bounded in memory: a damaged file may hold millions of odd lines. */
export class Findings {
  private readonly list: Finding[] = [];
  private readonly counts = new Map<string, number>();

  add(
    code: string,
    severity: Finding["severity"],
    message: string,
    place: { line?: number; layer?: number } = {},
  ): void {
    const count = (this.counts.get(code) ?? 0) + 1;
    this.counts.set(code, count);
    if (count <= KEPT) this.list.push({ code, severity, message, ...place });
  }

  count(code: string): number {
    return this.counts.get(code) ?? 0;
  }

  /** In file order; behind the last one kept of a kind, what is not kept is counted. */
  end(): Finding[] {
    const sorted = this.list.sort((a, b) => (a.line ?? 0) - (b.line ?? 0));
    const last = new Map(sorted.map(({ code }, position) => [code, position]));
    return sorted.flatMap((finding, position) => {
      const { code, severity } = finding;
      const count = this.count(code);
      if (count <= KEPT || last.get(code) !== position) return [finding];
      return [finding, { code, severity, message: `and ${count - KEPT} more like it, ${count} in all` }];
    });
  }
}
