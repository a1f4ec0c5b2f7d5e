import { Link } from "react-router-dom";
import type { Reading, Toolpath } from "#shared/contract/toolpaths.ts";
import { durationText } from "#shared/units/words.ts";
import { bytes, counted, moment } from "#src/lib/format.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { PartOutline } from "#src/ui/part-outline.tsx";
import { type Column, Table } from "#src/ui/table.tsx";

/** What to do with a toolpath next, and where. */
export interface NextStep {
  act: string;
  href: string;
}

interface Props {
  toolpaths: readonly Toolpath[];
  hrefOf(toolpath: Toolpath): string;
  /** undefined: nothing is to be done */
  nextOf(toolpath: Toolpath): NextStep | undefined;
  /** how many tuned files were written from it */
  tunedOf(toolpath: Toolpath): number;
}

const LINK = "underline decoration-rule underline-offset-4 hover:decoration-ink";
const latest = ({ readings }: Toolpath): Reading | undefined => readings[0];
const measure = (toolpath: Toolpath, text: (summary: NonNullable<Reading["summary"]>) => string): string => {
  const summary = latest(toolpath)?.summary;
  return summary ? text(summary) : "–";
};

/** Said only where it is not the usual one. */
const STATES: Partial<Record<Reading["state"], string>> = {
  queued: "waits to be read",
  running: "being read",
  refused: "refused",
  failed: "could not be read",
  cancelled: "reading given up",
};

export function ToolpathTable({ toolpaths, hrefOf, nextOf, tunedOf }: Props) {
  const columns: Column<Toolpath>[] = [
    {
      head: "Part",
      cell: (toolpath) => <PartOutline outline={latest(toolpath)?.summary?.outline} />,
    },
    {
      head: "Next",
      cell: (toolpath) => {
        const next = nextOf(toolpath);
        return (
          next && (
            <Link to={next.href} className={`${LINK} whitespace-nowrap`}>
              {next.act}
              <span className="sr-only">: {toolpath.name}</span>
            </Link>
          )
        );
      },
    },
    {
      head: "Toolpath",
      cell: (toolpath) => (
        <span className="block min-w-44">
          <Link to={hrefOf(toolpath)} className={`${LINK} font-semibold wrap-break-word`}>
            {toolpath.name}
          </Link>
          <span className="block text-small text-soft empty:hidden">{notesOf(toolpath)}</span>
        </span>
      ),
    },
    { head: "Read for", cell: ({ readings }) => machinesOf(readings) },
    { head: "Tuned", number: true, cell: (toolpath) => timesText(tunedOf(toolpath)) },
    { head: "Layers", number: true, cell: (toolpath) => measure(toolpath, ({ layers }) => counted(layers)) },
    {
      head: "Height",
      unit: "mm",
      number: true,
      cell: (toolpath) => measure(toolpath, ({ heightMm }) => fixedText(heightMm, 2)),
    },
    {
      head: "Print time",
      number: true,
      cell: (toolpath) => measure(toolpath, ({ printTimeS }) => durationText(printTimeS)),
    },
    { head: "Size", number: true, cell: (toolpath) => bytes(toolpath.bytes) },
    { head: "Brought in", number: true, cell: (toolpath) => moment(toolpath.createdAt) },
  ];
  return <Table label="Toolpaths" columns={columns} rows={toolpaths} keyOf={({ id }) => id} />;
}

/** How the latest reading stands, where there is something to say about it. */
function notesOf(toolpath: Toolpath): string {
  const reading = latest(toolpath);
  if (!reading) return "not read";
  const warnings = reading.summary?.warnings ?? 0;
  return STATES[reading.state] ?? (warnings === 0 ? "" : counted(warnings, "warning"));
}

const machinesOf = (readings: readonly Reading[]): string =>
  [...new Set(readings.map(({ machineName }) => machineName))].join(", ");

const timesText = (times: number): string => (times === 0 ? "no" : times === 1 ? "once" : `${counted(times)} times`);
