import type { Staged, Storage } from "#server/storage/storage.ts";
import { Turns } from "#server/storage/turns.ts";

/** Stored bytes together with the rows that refer to them. */
export class Shelf {
  readonly storage: Storage;
  private readonly turns = new Turns();
  private readonly used: (hashes: readonly string[]) => Promise<ReadonlySet<string>>;

  /** @param used which of these hashes any row refers to */
  constructor(storage: Storage, used: (hashes: readonly string[]) => Promise<ReadonlySet<string>>) {
    this.storage = storage;
    this.used = used;
  }

  /** Puts staged bytes in their place, then writes the rows; when that fails, the bytes go again. */
  keep<Result>(staged: readonly Staged[], record: () => Promise<Result>): Promise<Result> {
    return this.turns.take(async () => {
      for (const bytes of staged) await this.storage.keep(bytes);
      try {
        return await record();
      } catch (error) {
        await this.removeUnused(staged.map(({ sha256 }) => sha256));
        throw error;
      }
    });
  }

  /** Removes those of the hashes that no row refers to any more. */
  release(hashes: readonly string[]): Promise<void> {
    return this.turns.take(() => this.removeUnused(hashes));
  }

  /** Removes whatever no row refers to: the server ended between putting bytes in place and recording them. */
  sweep(): Promise<void> {
    return this.turns.take(async () => {
      let batch: string[] = [];
      for await (const sha256 of this.storage.list()) {
        batch.push(sha256);
        if (batch.length < 500) continue;
        await this.removeUnused(batch);
        batch = [];
      }
      await this.removeUnused(batch);
    });
  }

  private async removeUnused(hashes: readonly string[]): Promise<void> {
    if (hashes.length === 0) return;
    const used = await this.used(hashes);
    for (const sha256 of hashes) if (!used.has(sha256)) await this.storage.remove(sha256);
  }
}
