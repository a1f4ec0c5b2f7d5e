import type { Member } from "#shared/contract/members.ts";
import type { Role } from "#shared/contract/roles.ts";
import { moment } from "#src/lib/format.ts";
import { type Column, Table } from "#src/ui/table.tsx";

/** What each role may do; each includes those before it. */
export const ROLE_TEXTS: Record<Role, string> = {
  viewer: "looks at everything",
  operator: "what a viewer may; brings toolpaths in, tunes with approved profile versions, downloads",
  engineer: "what an operator may; writes profiles, machines and polymers, tunes with any version for trials",
  lead: "what an engineer may; approves profile versions, adds members",
};

const COLUMNS: Column<Member>[] = [
  {
    head: "E-mail",
    cell: ({ email, name }) => <span className="wrap-break-word">{name ? `${name}, ${email}` : email}</span>,
  },
  { head: "Role", cell: ({ role }) => <span className="font-semibold">{role}</span> },
  { head: "May do", cell: ({ role }) => ROLE_TEXTS[role] },
  { head: "Member since", number: true, cell: ({ createdAt }) => moment(createdAt) },
];

export function MemberTable({ members }: { members: readonly Member[] }) {
  return <Table label="Members" columns={COLUMNS} rows={members} keyOf={({ id }) => id} />;
}
