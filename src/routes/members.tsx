import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { useMay, useSession } from "#src/features/auth/session-context.tsx";
import { AddMemberDialog } from "#src/features/teams/add-member-dialog.tsx";
import { MemberTable } from "#src/features/teams/member-table.tsx";
import { membersQuery } from "#src/features/teams/queries.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { Button } from "#src/ui/button.tsx";
import { PageHead } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

export function MembersPage() {
  usePageTitle("Members");
  const { team } = useSession();
  const may = useMay();
  const members = useQuery(membersQuery);
  const [adding, setAdding] = useState(false);
  return (
    <>
      <PageHead
        title="Members"
        note={may("manage-members") ? team.name : `${team.name}. The lead adds members.`}
        actions={
          may("manage-members") && (
            <Button weight="main" onClick={() => setAdding(true)}>
              Add a member
            </Button>
          )
        }
      />
      <Loaded query={members} what="Looking for members">
        {(list) => <MemberTable members={list} />}
      </Loaded>
      {adding && <AddMemberDialog onClose={() => setAdding(false)} />}
    </>
  );
}
