import type { LayerReading, ReadingDocument } from "#shared/formats/reading.ts";

type Cell = string | number | null;

const MEASURES: (keyof LayerReading & string)[] = [
  "index",
  "object",
  "zMm",
  "heightMm",
  "firstLine",
  "lastLine",
  "timeS",
  "extrudingTimeS",
  "depositedLengthMm",
  "travelLengthMm",
  "filamentMm",
  "volumeMm3",
  "areaMm2",
  "outlineMm",
  "nozzleC",
  "bedC",
];

/**
 * The layers as a table, a row a layer: RFC 4180, a header line, decimal points. Duties are given by channel as the
 * file commands them.
 */
export function* layersCsv(
  { layers }: ReadingDocument,
  channels: readonly string[],
): Generator<string, void, undefined> {
  const duties = channels.flatMap((id) => [`${id} mean`, `${id} min`, `${id} max`]);
  yield row([...MEASURES, ...duties, "waits"]);
  for (const layer of layers) {
    const measured = MEASURES.map((name) => layer[name] as Cell);
    const seen = channels.flatMap((id) => {
      const duty = layer.duty[id];
      return duty ? [duty.mean, duty.min, duty.max] : [null, null, null];
    });
    yield row([...measured, ...seen, layer.waits.map(({ kind }) => kind).join(" ")]);
  }
}

const row = (cells: readonly Cell[]): string => `${cells.map((cell) => quoted(cell ?? "")).join(",")}\r\n`;

const quoted = (cell: string | number): string => {
  const text = String(cell);
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
};
