import { version } from "#server/cli/version.ts";
import { packReading } from "#server/jobs/full-reading.ts";
import { type JobContext, stageBytes, stageText } from "#server/jobs/job-context.ts";
import type { ReadResult, ReadTask } from "#server/jobs/tasks.ts";
import { tableBytes } from "#server/storage/number-table.ts";
import { layersCsv } from "#server/toolpaths/layers-csv.ts";
import type { StoredFile } from "#shared/contract/common.ts";
import type { Machine } from "#shared/formats/machine.ts";
import { outlineOf } from "#shared/layers/outline.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { readingDocument } from "#shared/layers/reading-document.ts";

/**
 * Reads a stored toolpath and stages what others ask for later: the full reading (for tuning), the document (for people
 * and the client), the layer table, and where each layer's part of the file begins.
 *
 * @throws Refusal
 */
export async function readJob(task: ReadTask, context: JobContext): Promise<ReadResult> {
  const reading = await readStored(task.file, task.machine, context);
  const document = readingDocument(reading);
  const csv = layersCsv(
    document,
    task.machine.channels.map(({ id }) => id),
  );
  return {
    kind: "read",
    summary: summaryOf(reading),
    reading: await stageBytes(context, [packReading(reading, version)]),
    document: await stageText(context, JSON.stringify(document)),
    table: await stageText(context, [...csv].join("")),
    places: await stageBytes(context, tableBytes(layerPlaces(reading))),
  };
}

export async function readStored(file: StoredFile, machine: Machine, context: JobContext): Promise<Reading> {
  const { storage, signal, progress } = context;
  const reader = new ToolpathReader(machine);
  for await (const chunk of await storage.open(file.sha256)) {
    signal.throwIfAborted();
    reader.push(chunk);
    progress(reader.progress);
  }
  return reader.end(file.sha256);
}

/** Byte and line at which each layer's own commands are written; last, the end of the file. */
export function layerPlaces({ layers, file }: Reading): [offset: number, line: number][] {
  const places = layers.map(({ writeAt }): [number, number] => [writeAt.offset, writeAt.line]);
  return [...places, [file.bytes, file.lines + 1]];
}

function summaryOf({ file, totals, layers, findings }: Reading): ReadResult["summary"] {
  return {
    lines: file.lines,
    layers: totals.layers,
    heightMm: layers.reduce((highest, { zMm }) => Math.max(highest, zMm), 0),
    printTimeS: totals.printTimeS,
    depositedLengthMm: totals.depositedLengthMm,
    filamentMm: totals.filamentMm,
    warnings: findings.filter(({ severity }) => severity === "warning").length,
    outline: outlineOf(layers),
  };
}
