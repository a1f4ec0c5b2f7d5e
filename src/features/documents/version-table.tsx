import { Link } from "react-router-dom";
import type { VersionHead } from "#shared/contract/documents.ts";
import { moment } from "#src/lib/format.ts";
import { Button } from "#src/ui/button.tsx";
import { type Column, Table } from "#src/ui/table.tsx";

interface Props {
  versions: readonly VersionHead[];
  shown: number;
  hrefOf(number: number): string;
  compareHref(from: number, to: number): string;
  /** left out for who may not edit */
  onRestore?(number: number): void;
  /** left out for who may not approve, and where nothing is approved */
  onApprove?(number: number): void;
  withApproval: boolean;
}

const LINK = "underline decoration-rule underline-offset-4 hover:decoration-ink";

/** Every version there was; none is ever overwritten. */
export function VersionTable(props: Props) {
  const { versions, shown, hrefOf, compareHref, onRestore, onApprove, withApproval } = props;
  const latest = versions[0]?.number;
  const columns: Column<VersionHead>[] = [
    {
      head: "Version",
      number: true,
      cell: ({ number }) => (
        <Link to={hrefOf(number)} className={LINK}>
          {number}
        </Link>
      ),
    },
    { head: "Saved", number: true, cell: ({ createdAt }) => moment(createdAt) },
    { head: "By", cell: ({ createdBy }) => createdBy },
    { head: "Why", cell: ({ note }) => note ?? "" },
    ...(withApproval ? [{ head: "Approved", cell: approvedText }] : []),
  ];
  const offersSomething =
    versions.length > 1 || (onApprove && versions.some(({ approvedAt }) => approvedAt === undefined));
  if (offersSomething) {
    columns.push({
      head: "Actions",
      cell: ({ number, approvedAt }) => (
        <span className="flex flex-wrap items-baseline gap-x-4">
          {number > 1 && (
            <Link to={compareHref(number - 1, number)} className={`${LINK} py-1 whitespace-nowrap`}>
              Compare with {number - 1}
            </Link>
          )}
          {onRestore && number !== latest && (
            <Button weight="quiet" onClick={() => onRestore(number)}>
              Restore as {(latest ?? 0) + 1}
            </Button>
          )}
          {onApprove && approvedAt === undefined && (
            <Button weight="quiet" onClick={() => onApprove(number)}>
              Approve
            </Button>
          )}
        </span>
      ),
    });
  }
  return (
    <Table
      label="Versions"
      columns={columns}
      rows={versions}
      keyOf={({ number }) => number}
      current={({ number }) => number === shown}
    />
  );
}

function approvedText({ approvedAt, approvedBy }: VersionHead): string {
  return approvedAt === undefined ? "" : `by ${approvedBy} on ${moment(approvedAt)}`;
}
