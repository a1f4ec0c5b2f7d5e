import { Link } from "react-router-dom";
import type { DocumentSummary } from "#shared/contract/documents.ts";
import { moment } from "#src/lib/format.ts";
import { type Column, Table } from "#src/ui/table.tsx";

interface Props {
  label: string;
  documents: readonly DocumentSummary[];
  hrefOf(document: DocumentSummary): string;
  /** profiles are approved for parts that ship */
  withApproval: boolean;
}

export function DocumentTable({ label, documents, hrefOf, withApproval }: Props) {
  const columns: Column<DocumentSummary>[] = [
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
    { head: "Latest", number: true, cell: ({ latest }) => latest.number },
    ...(withApproval ? [{ head: "Approved", number: true, cell: approvedText }] : []),
    { head: "Saved", number: true, cell: ({ latest }) => moment(latest.createdAt) },
    { head: "By", cell: ({ latest }) => latest.createdBy },
    { head: "Why", cell: ({ latest }) => latest.note ?? "" },
  ];
  return <Table label={label} columns={columns} rows={documents} keyOf={({ id }) => id} />;
}

function approvedText({ approved = [] }: DocumentSummary): string {
  return approved.length === 0 ? "none" : String(approved.at(-1));
}
