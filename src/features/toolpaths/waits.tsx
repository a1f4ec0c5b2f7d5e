import type { LayerReading } from "#shared/formats/reading.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { type Column, Table } from "#src/ui/table.tsx";

type Wait = LayerReading["waits"][number] & { layer: number };

const KINDS: Record<Wait["kind"], string> = {
  temperature: "for a temperature",
  home: "homing",
  tool: "tool change",
  pause: "pause",
  dwell: "dwell",
};

const COLUMNS: Column<Wait>[] = [
  { head: "Layer", number: true, cell: ({ layer }) => layer },
  { head: "Line", number: true, cell: ({ line }) => line },
  { head: "What", cell: ({ kind }) => KINDS[kind] },
  {
    head: "Lasts",
    unit: "s",
    number: true,
    cell: ({ seconds }) => (seconds === null ? "not known" : fixedText(seconds, 1)),
  },
];

/** Where the print stands still. What has no known length is not in the print time. */
export function Waits({ layers }: { layers: readonly LayerReading[] }) {
  const waits = layers.flatMap(({ index, waits }) => waits.map((wait) => ({ ...wait, layer: index })));
  if (waits.length === 0)
    return <p className="text-soft">None: the print never stands still between its first and last layer.</p>;
  return <Table label="Dwells and pauses" columns={COLUMNS} rows={waits} keyOf={({ line }) => line} />;
}
