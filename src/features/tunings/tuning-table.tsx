import { Link } from "react-router-dom";
import type { Tuning } from "#shared/contract/tunings.ts";
import { moment } from "#src/lib/format.ts";
import { PartOutline } from "#src/ui/part-outline.tsx";
import { type Column, Table } from "#src/ui/table.tsx";

/** Said only where it is not the usual one. */
const STATES: Partial<Record<Tuning["state"], string>> = {
  queued: "waits its turn",
  running: "being written",
  refused: "refused",
  failed: "could not be written",
  cancelled: "given up",
};

export function TuningTable({ tunings, hrefOf }: { tunings: readonly Tuning[]; hrefOf(tuning: Tuning): string }) {
  const columns: Column<Tuning>[] = [
    { head: "Part", cell: ({ outline, plan }) => <PartOutline outline={outline} targets={plan?.targets} /> },
    {
      head: "Tuning",
      cell: (tuning) => (
        <span className="block min-w-44">
          <Link
            to={hrefOf(tuning)}
            className="font-semibold wrap-anywhere underline decoration-rule underline-offset-4 hover:decoration-ink"
          >
            {tuning.fileName}
          </Link>
          <span className="block text-small text-soft empty:hidden">{noteOf(tuning)}</span>
        </span>
      ),
    },
    {
      head: "Profile",
      cell: ({ profileName, profileVersion }) => (
        <>
          {profileName}, <span className="whitespace-nowrap">version {profileVersion}</span>
        </>
      ),
    },
    { head: "Machine", cell: ({ machineName }) => machineName },
    { head: "Meant for", cell: ({ status }) => (status === "approved" ? "parts that ship" : "trials only") },
    { head: "Written", number: true, cell: ({ createdAt }) => moment(createdAt) },
  ];
  return <Table label="Tunings" columns={columns} rows={tunings} keyOf={({ id }) => id} />;
}

const noteOf = ({ state, proof }: Tuning): string =>
  STATES[state] ?? (proof?.passed === false ? "the proof failed: no file" : "");
