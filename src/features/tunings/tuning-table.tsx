import { Link } from "react-router-dom";
import type { Tuning } from "#shared/contract/tunings.ts";
import { moment } from "#src/lib/format.ts";
import { type Column, Table } from "#src/ui/table.tsx";

const STATES: Record<Tuning["state"], string> = {
  queued: "waits its turn",
  running: "being written",
  done: "written",
  refused: "refused",
  failed: "could not be written",
  cancelled: "given up",
};

export function TuningTable({ tunings, hrefOf }: { tunings: readonly Tuning[]; hrefOf(tuning: Tuning): string }) {
  const columns: Column<Tuning>[] = [
    {
      head: "Tuning",
      cell: (tuning) => (
        <Link
          to={hrefOf(tuning)}
          className="font-semibold wrap-break-word underline decoration-rule underline-offset-4 hover:decoration-ink"
        >
          {tuning.fileName}
        </Link>
      ),
    },
    { head: "Profile", cell: (tuning) => tuning.profileName },
    { head: "Version", number: true, cell: (tuning) => tuning.profileVersion },
    { head: "Machine", cell: (tuning) => tuning.machineName },
    { head: "State", cell: (tuning) => STATES[tuning.state] },
    { head: "Use", cell: ({ status }) => (status === "approved" ? "approved" : "trial only") },
    { head: "Written", number: true, cell: (tuning) => moment(tuning.createdAt) },
  ];
  return <Table label="Tunings" columns={columns} rows={tunings} keyOf={({ id }) => id} />;
}
