import type { DocumentSummary } from "#shared/contract/documents.ts";
import { lackingChannels, type ProfileGist } from "#shared/contract/gists.ts";
import { TargetMark } from "#src/features/profiles/target-mark.tsx";
import type { Column } from "#src/ui/table.tsx";

/** What tells profiles apart in a list: material, wanted states, the machines that can follow them, approval. */
export function profileColumns(machines: readonly DocumentSummary[]): Column<DocumentSummary>[] {
  return [
    { head: "For", cell: ({ profile }) => profile && <For profile={profile} machines={machines} /> },
    { head: "Targets", cell: ({ profile }) => profile && <Zones zones={profile.zones} /> },
    { head: "Approved", cell: approvedText },
  ];
}

/** As they lie in the part: the last zone on top. */
function Zones({ zones }: Pick<ProfileGist, "zones">) {
  return (
    <ol className="flex flex-col-reverse">
      {zones.map(({ name, target }, z) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: zones of one version never move, and two may share a name
        <li key={z} className="grid grid-cols-[minmax(4rem,auto)_1fr] gap-x-3">
          <span className="text-small text-soft">{name}</span>
          <TargetMark target={target} />
        </li>
      ))}
    </ol>
  );
}

/** The polymer, and the machines that have every channel it drives. */
function For({ profile, machines }: { profile: ProfileGist; machines: readonly DocumentSummary[] }) {
  const fitting = machines.filter(({ machine }) => machine && lackingChannels(profile, machine).length === 0);
  const channels = profile.drives.map(({ id }) => id).join(", ");
  return (
    <>
      <span className="block whitespace-nowrap">{profile.polymer}</span>
      <span className="block text-small text-soft">
        {fitting.length > 0
          ? `on ${fitting.map(({ name }) => name).join(", ")}`
          : `fits no machine: drives ${channels}`}
      </span>
    </>
  );
}

function approvedText({ approved = [], latest }: DocumentSummary): string {
  const last = approved.at(-1);
  if (last === undefined) return "no version";
  return last === latest.number ? `version ${last}` : `version ${last}, not the latest`;
}
