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
        <span className="block min-w-40">
          <Link to={hrefOf(toolpath)} className={`${LINK} font-semibold wrap-break-word`}>
            {toolpath.name}
          </Link>
          <span className="block text-small text-soft">{notesOf(toolpath, tunedOf(toolpath))}</span>
        </span>
      ),
    },
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
    {
      head: "Brought in",
      number: true,
      cell: (toolpath) => (
        <>
          {moment(toolpath.createdAt)}
          <span className="block text-soft">{bytes(toolpath.bytes)}</span>
        </>
      ),
    },
  ];
  return <Table label="Toolpaths" columns={columns} rows={toolpaths} keyOf={({ id }) => id} />;
}

/** `for Tern, tuned once, 2 warnings`; how the latest reading stands, where that is not as usual. */
function notesOf(toolpath: Toolpath, tuned: number): string {
  const { readings } = toolpath;
  if (readings.length === 0) return "not read";
  const [{ state, summary }] = readings;
  const machines = [...new Set(readings.map(({ machineName }) => machineName))].join(", ");
  const warnings = summary?.warnings ?? 0;
  const notes = [
    `for ${machines}`,
    tuned === 1 ? "tuned once" : tuned > 1 && `tuned ${counted(tuned)} times`,
    STATES[state],
    warnings > 0 && counted(warnings, "warning"),
  ];
  return notes.filter(Boolean).join(", ");
}
