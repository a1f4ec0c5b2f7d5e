import type { Member } from "#shared/contract/members.ts";
import type { Role } from "#shared/contract/roles.ts";
import { moment } from "#src/lib/format.ts";
import { type Column, Table } from "#src/ui/table.tsx";

/** What each role adds to those before it. */
export const ROLE_TEXTS: Record<Role, string> = {
  viewer: "sees everything",
  operator: "brings toolpaths in, tunes with approved profile versions, downloads",
  engineer: "writes profiles, machines and polymers, tunes with any version for trials",
  lead: "approves profile versions, adds members",
};

const COLUMNS: Column<Member>[] = [
  {
    head: "E-mail",
    cell: ({ email, name }) => <span className="wrap-break-word">{name ? `${name}, ${email}` : email}</span>,
  },
  { head: "Role", cell: ({ role }) => <span className="font-semibold">{role}</span> },
  { head: "May", cell: ({ role }) => ROLE_TEXTS[role] },
  { head: "Member since", number: true, cell: ({ createdAt }) => moment(createdAt) },
];

export function MemberTable({ members }: { members: readonly Member[] }) {
  return <Table label="Members" columns={COLUMNS} rows={members} keyOf={({ id }) => id} />;
}
