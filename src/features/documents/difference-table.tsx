import { type Difference, differences } from "#src/features/documents/differences.ts";
import { type Column, Table } from "#src/ui/table.tsx";

interface Side {
  name: string;
  document: unknown;
}

/** Two documents, place by place. Signs say what came and went, as in the diff of a toolpath. */
export function DifferenceTable({ before, after }: { before: Side; after: Side }) {
  const found = differences(before.document, after.document);
  if (found.length === 0) return <p className="text-soft">They say the same.</p>;
  const columns: Column<Difference>[] = [
    { head: "Place", cell: ({ path }) => <code className="font-mono text-small wrap-anywhere">{path}</code> },
    { head: before.name, cell: ({ before }) => <Value sign="−" text={before} /> },
    { head: after.name, cell: ({ after }) => <Value sign="+" text={after} /> },
  ];
  return <Table label={`${before.name} and ${after.name}`} columns={columns} rows={found} keyOf={({ path }) => path} />;
}

function Value({ sign, text }: { sign: string; text: string | undefined }) {
  if (text === undefined) return <span className="text-soft">not there</span>;
  return (
    <span className="font-mono text-small wrap-anywhere">
      <span aria-hidden>{sign} </span>
      {text}
    </span>
  );
}
