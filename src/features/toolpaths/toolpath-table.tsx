import { Link } from "react-router-dom";
import type { Reading, Toolpath } from "#shared/contract/toolpaths.ts";
import { bytes, duration, moment } from "#src/lib/format.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { type Column, Table } from "#src/ui/table.tsx";

const latest = ({ readings }: Toolpath): Reading | undefined => readings[0];
const measure = (toolpath: Toolpath, text: (summary: NonNullable<Reading["summary"]>) => string): string => {
  const summary = latest(toolpath)?.summary;
  return summary ? text(summary) : "–";
};

const STATES: Record<Reading["state"], string> = {
  queued: "waits to be read",
  running: "being read",
  done: "read",
  refused: "refused",
  failed: "could not be read",
  cancelled: "reading given up",
};

export function ToolpathTable({
  toolpaths,
  hrefOf,
}: {
  toolpaths: readonly Toolpath[];
  hrefOf(toolpath: Toolpath): string;
}) {
  const columns: Column<Toolpath>[] = [
    {
      head: "Toolpath",
      cell: (toolpath) => (
        <Link
          to={hrefOf(toolpath)}
          className="font-semibold wrap-break-word underline decoration-rule underline-offset-4 hover:decoration-ink"
        >
          {toolpath.name}
        </Link>
      ),
    },
    { head: "Machine", cell: (toolpath) => latest(toolpath)?.machineName ?? "–" },
    { head: "State", cell: (toolpath) => stateText(latest(toolpath)) },
    { head: "Layers", number: true, cell: (toolpath) => measure(toolpath, ({ layers }) => String(layers)) },
    {
      head: "Height",
      unit: "mm",
      number: true,
      cell: (toolpath) => measure(toolpath, ({ heightMm }) => fixedText(heightMm, 2)),
    },
    {
      head: "Print time",
      number: true,
      cell: (toolpath) => measure(toolpath, ({ printTimeS }) => duration(printTimeS)),
    },
    { head: "Size", number: true, cell: (toolpath) => bytes(toolpath.bytes) },
    { head: "Brought in", number: true, cell: (toolpath) => moment(toolpath.createdAt) },
  ];
  return <Table label="Toolpaths" columns={columns} rows={toolpaths} keyOf={({ id }) => id} />;
}

function stateText(reading: Reading | undefined): string {
  if (!reading) return "not read";
  const warnings = reading.summary?.warnings ?? 0;
  if (reading.state !== "done" || warnings === 0) return STATES[reading.state];
  return `read, ${warnings} warning${warnings === 1 ? "" : "s"}`;
}
