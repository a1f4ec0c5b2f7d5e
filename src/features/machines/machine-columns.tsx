import type { DocumentSummary } from "#shared/contract/documents.ts";
import type { MachineGist } from "#shared/contract/gists.ts";
import type { Column } from "#src/ui/table.tsx";

/** What tells machines apart in a list: the fans and heaters that profiles drive. */
export const MACHINE_COLUMNS: Column<DocumentSummary>[] = [
  { head: "Fans", cell: ({ machine }) => machine && <Channels of="fan" {...machine} /> },
  { head: "Radiant heaters", cell: ({ machine }) => machine && <Channels of="heater" {...machine} /> },
];

function Channels({ channels, of }: MachineGist & { of: "fan" | "heater" }) {
  const ids = channels.filter(({ kind }) => kind === of).map(({ id }) => id);
  if (ids.length === 0) return <span className="text-soft">none</span>;
  return <code className="font-mono text-small">{ids.join(", ")}</code>;
}
