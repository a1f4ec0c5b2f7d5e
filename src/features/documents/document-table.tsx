import { Link } from "react-router-dom";
import type { DocumentSummary } from "#shared/contract/documents.ts";
import { moment } from "#src/lib/format.ts";
import { type Column, Table } from "#src/ui/table.tsx";

interface Props {
  label: string;
  documents: readonly DocumentSummary[];
  hrefOf(document: DocumentSummary): string;
  /** what one wants to know of this kind of document, beside its name and latest version */
  columns: readonly Column<DocumentSummary>[];
}

export function DocumentTable({ label, documents, hrefOf, columns }: Props) {
  const all: Column<DocumentSummary>[] = [
    {
      head: "Name",
      cell: (document) => (
        <Link
          to={hrefOf(document)}
          className="font-semibold wrap-break-word underline decoration-rule underline-offset-4 hover:decoration-ink"
        >
          {document.name}
        </Link>
      ),
    },
    ...columns,
    { head: "Latest version", cell: ({ latest }) => <Latest {...latest} /> },
  ];
  return <Table label={label} columns={all} rows={documents} keyOf={({ id }) => id} />;
}

function Latest({ number, createdAt, createdBy, note }: DocumentSummary["latest"]) {
  return (
    <>
      <span className="font-mono text-small whitespace-nowrap">
        {number} · {moment(createdAt)}
      </span>
      <span className="block text-small text-soft">{createdBy}</span>
      <span className="block max-w-72 text-small text-soft wrap-break-word empty:hidden">{note}</span>
    </>
  );
}
