import type { Staged } from "#server/storage/storage.ts";
import type { RefusalReport, StoredFile } from "#shared/contract/common.ts";
import type { Reading as ReadingRow } from "#shared/contract/toolpaths.ts";
import type { Tuning } from "#shared/contract/tunings.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Profile } from "#shared/formats/profile.ts";

/** Everything a worker needs for one job: it has the stored bytes and this, and no database. */
export type Task = ReadTask | TuneTask;

export interface ReadTask {
  kind: "read";
  file: StoredFile;
  machine: Machine;
}

export interface TuneTask {
  kind: "tune";
  file: StoredFile;
  /** digest of the full reading, see full-reading.ts */
  reading: string;
  machine: Machine;
  profile: Profile;
  polymer?: Polymer;
  status: "trial-only" | "approved";
}

/** What a worker hands back: bytes stay staged until the rows that refer to them are written. */
export interface ReadResult {
  kind: "read";
  summary: NonNullable<ReadingRow["summary"]>;
  reading: Staged;
  document: Staged;
  table: Staged;
  places: Staged;
}

export interface TuneResult {
  kind: "tune";
  /** left out where the proof failed: those bytes are never kept */
  tuned?: Staged;
  plan: Staged;
  proof: Staged;
  changes: Staged;
  places: Staged;
  edits: Staged;
  planned: NonNullable<Tuning["plan"]>;
  proven: { passed: boolean; checks: number };
}

export type TaskResult = ReadResult | TuneResult;
/** Result of a task of one kind. */
export type ResultOf<Kind extends Task["kind"]> = Extract<TaskResult, { kind: Kind }>;

export interface TaskProgress {
  bytes: number;
  layers?: number;
}

/** To the worker. */
export type ToWorker = { say: "run"; job: string; task: Task } | { say: "cancel" };
/** From the worker. */
export type FromWorker =
  | { say: "ready" }
  | { say: "progress"; progress: TaskProgress }
  | { say: "done"; result: TaskResult }
  | { say: "refused"; refusal: RefusalReport }
  | { say: "cancelled" }
  | { say: "failed"; reason: string };

/** Given to the worker when it starts. */
export interface WorkerData {
  storageRoot: string;
}
