import type { DifferenceRun, Span } from "#src/features/tunings/plan-differences.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { PREDICTED_NAMES } from "#src/lib/state-fill.ts";
import { type Column, Table } from "#src/ui/table.tsx";

interface Props {
  runs: readonly DifferenceRun[];
  onPin(layer: number): void;
}

/** Where two plans differ: run by run of layers, which channel, from what to what, and what that is predicted to change. */
export function DifferenceRuns({ runs, onPin }: Props) {
  if (runs.length === 0) return <p className="text-soft">Both come to the same duties in every layer.</p>;
  const columns: Column<DifferenceRun>[] = [
    {
      head: "Layers",
      cell: ({ first, last, count }) => (
        <button
          type="button"
          onClick={() => onPin(first)}
          className="min-h-6 font-mono text-small whitespace-nowrap underline decoration-rule underline-offset-4 hover:decoration-ink"
        >
          {count === 1 ? first : `${first}–${last}`}
        </button>
      ),
    },
    {
      head: "Channel",
      cell: ({ channels }) =>
        channels.length === 0 ? (
          <span className="text-small text-soft">none: heat from below</span>
        ) : (
          channels.map(({ id }) => (
            <code key={id} className="block font-mono text-small whitespace-nowrap">
              {id}
            </code>
          ))
        ),
    },
    {
      head: "Before",
      number: true,
      cell: ({ channels }) => channels.map(({ id, before }) => <Duty key={id} span={before} />),
    },
    {
      head: "After",
      number: true,
      cell: ({ channels }) => channels.map(({ id, after }) => <Duty key={id} span={after} />),
    },
    { head: "Interlayer", unit: "K", number: true, cell: ({ interlayerC }) => changeText(interlayerC, 0) },
    { head: "Crystallinity", number: true, cell: ({ crystallinity }) => changeText(crystallinity, 3) },
    {
      head: "State",
      cell: ({ states }) =>
        states === undefined
          ? "–"
          : states.before === states.after
            ? PREDICTED_NAMES[states.after].toLowerCase()
            : `${PREDICTED_NAMES[states.before].toLowerCase()} → ${PREDICTED_NAMES[states.after].toLowerCase()}`,
    },
  ];
  return <Table label="Differences" columns={columns} rows={runs} keyOf={({ first }) => first} />;
}

function Duty({ span }: { span: Span | undefined }) {
  return (
    <span className="block">{span === undefined ? "not driven" : spanText(span, (duty) => fixedText(duty, 3))}</span>
  );
}

function changeText(span: Span | undefined, decimals: number): string {
  if (span === undefined) return "–";
  return spanText(span, (change) => `${Number(change.toFixed(decimals)) > 0 ? "+" : ""}${fixedText(change, decimals)}`);
}

function spanText([least, most]: Span, text: (value: number) => string): string {
  const [from, to] = [text(least), text(most)];
  return from === to ? from : `${from} to ${to}`;
}
