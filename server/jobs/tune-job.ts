import { createHash } from "node:crypto";
import { documentDigest } from "#server/cli/documents.ts";
import { version } from "#server/cli/version.ts";
import { unpackReading } from "#server/jobs/full-reading.ts";
import { type JobContext, stageBytes, stageText } from "#server/jobs/job-context.ts";
import { layerPlaces, readStored } from "#server/jobs/read-job.ts";
import type { TuneResult, TuneTask } from "#server/jobs/tasks.ts";
import { tableBytes } from "#server/storage/number-table.ts";
import type { Staged } from "#server/storage/storage.ts";
import { bandTargets } from "#server/tunings/band-targets.ts";
import { editRow, layerRow, PlaceFinder } from "#server/tunings/tuned-places.ts";
import { writePlan } from "#shared/formats/plan.ts";
import { type ProofDocument, writeProof } from "#shared/formats/proof.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { prove } from "#shared/prove/prove.ts";
import { prepareTuning, type Tuning } from "#shared/rewrite/prepare-tuning.ts";
import { Rewriter } from "#shared/rewrite/rewriter.ts";

/**
 * Plans, writes the tuned bytes, and proves them against the original in a third pass. Only the rewriting touches the
 * file's bytes anew: the reading was kept. Bytes whose proof fails are thrown away.
 *
 * @throws Refusal
 */
export async function tuneJob(task: TuneTask, context: JobContext): Promise<TuneResult> {
  const { storage } = context;
  const reading = (await keptReading(task, context)) ?? (await readStored(task.file, task.machine, context));
  const { machine, profile, polymer, status } = task;
  const documents = { machine, profile, polymer, status };
  const tuning = prepareTuning({ reading, ...documents, digest: documentDigest, engine: version });
  const finder = new PlaceFinder(tuning.edits, layerPlaces(reading));
  const tuned = await storage.stage(rewritten(task, reading, tuning, finder, context), context.owner);
  finder.turn();
  const proof = await proveStaged(task, reading, tuned, finder, context);
  if (!proof.passed) await storage.discard(tuned);
  const { edits, layers } = finder.end();
  const changed = layers.slice(0, -1).flatMap(({ firstEdit }, k) => (firstEdit < layers[k + 1].firstEdit ? k + 1 : []));
  return {
    kind: "tune",
    ...(proof.passed ? { tuned } : {}),
    plan: await stageText(context, writePlan(tuning.plan)),
    proof: await stageText(context, writeProof(proof)),
    changes: await stageText(context, JSON.stringify(changed)),
    places: await stageBytes(context, tableBytes(layers.map(layerRow))),
    edits: await stageBytes(context, tableBytes(edits.map(editRow))),
    planned: {
      layers: tuning.plan.layers.length,
      advice: tuning.plan.advice.length,
      targets: bandTargets(reading.layers, task.profile),
    },
    proven: { passed: proof.passed, checks: proof.checks.length },
  };
}

async function keptReading(task: TuneTask, { storage }: JobContext): Promise<Reading | undefined> {
  const pieces: Uint8Array[] = [];
  for await (const piece of await storage.open(task.reading)) pieces.push(piece);
  return unpackReading(Buffer.concat(pieces), version);
}

/** The second pass. The rewriter uses its buffer again, so what goes to the disk is copied out of it. */
async function* rewritten(
  task: TuneTask,
  reading: Reading,
  { edits }: Tuning,
  finder: PlaceFinder,
  { storage, signal, progress }: JobContext,
): AsyncGenerator<Uint8Array, void, undefined> {
  let pieces: Uint8Array[] = [];
  const rewriter = new Rewriter(edits, reading.file, (bytes) => pieces.push(bytes.slice()));
  let bytes = 0;
  for await (const chunk of await storage.open(task.file.sha256)) {
    signal.throwIfAborted();
    finder.original(chunk);
    rewriter.push(chunk);
    yield* pieces;
    pieces = [];
    bytes += chunk.length;
    progress({ bytes });
  }
  rewriter.end();
  yield* pieces;
}

/** The third pass, over both files side by side. */
async function proveStaged(
  task: TuneTask,
  reading: Reading,
  tuned: Staged,
  finder: PlaceFinder,
  { storage, signal, progress }: JobContext,
): Promise<ProofDocument> {
  const { machine, profile, polymer, status } = task;
  const input = new Hashed(await storage.open(task.file.sha256), (_, bytes) => {
    signal.throwIfAborted();
    progress({ bytes: task.file.bytes + bytes });
  });
  const output = new Hashed(await storage.openStaged(tuned), (chunk) => finder.tuned(chunk));
  return prove({
    original: input.chunks(),
    tuned: output.chunks(),
    reading,
    machine,
    profile,
    polymer,
    digest: documentDigest,
    hashes: () => ({ input: input.digest(), output: output.digest() }),
    engine: version,
    expected: { engine: version, status },
  });
}

/** A stream that is hashed as it is read. */
class Hashed {
  private readonly source: AsyncIterable<Uint8Array>;
  private readonly onChunk: (chunk: Uint8Array, bytesSoFar: number) => void;
  private readonly hash = createHash("sha256");
  private bytes = 0;

  constructor(source: AsyncIterable<Uint8Array>, onChunk: (chunk: Uint8Array, bytesSoFar: number) => void) {
    this.source = source;
    this.onChunk = onChunk;
  }

  async *chunks(): AsyncGenerator<Uint8Array, void, undefined> {
    for await (const chunk of this.source) {
      this.hash.update(chunk);
      this.bytes += chunk.length;
      this.onChunk(chunk, this.bytes);
      yield chunk;
    }
  }

  digest(): { sha256: string; bytes: number } {
    return { sha256: this.hash.digest("hex"), bytes: this.bytes };
  }
}
