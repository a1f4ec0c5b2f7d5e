import type { TaskProgress } from "#server/jobs/tasks.ts";
import type { Staged, Storage } from "#server/storage/storage.ts";

/** What a job in a worker works with. */
export interface JobContext {
  storage: Storage;
  /** under whose name bytes are staged */
  owner: string;
  signal: AbortSignal;
  progress: (progress: TaskProgress) => void;
}

/** Stages bytes that are there already. */
export function stageBytes({ storage, owner }: JobContext, pieces: Iterable<Uint8Array>): Promise<Staged> {
  return storage.stage(
    (async function* () {
      yield* pieces;
    })(),
    owner,
  );
}

export function stageText(context: JobContext, text: string): Promise<Staged> {
  return stageBytes(context, [Buffer.from(text)]);
}
