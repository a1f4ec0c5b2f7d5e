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

  /** In file order; a kind with more than what is kept ends with a line that counts the rest. */
  end(): Finding[] {
    const rest = [...this.counts]
      .filter(([, count]) => count > KEPT)
      .map(([code, count]): Finding => {
        const { severity } = this.list.find((finding) => finding.code === code)!;
        return { code, severity, message: `and ${count - KEPT} more findings "${code}" (${count} in all)` };
      });
    return [...this.list.sort((a, b) => (a.line ?? 0) - (b.line ?? 0)), ...rest];
  }
}
