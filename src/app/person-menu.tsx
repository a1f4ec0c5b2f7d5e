import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { useNavigate } from "react-router-dom";
import { paths } from "#src/app/paths.ts";
import { SheetSwitch } from "#src/app/sheet-switch.tsx";
import { endAllSessions, endSession, sessionQuery } from "#src/features/auth/queries.ts";
import { useSession } from "#src/features/auth/session-context.tsx";
import { asProblem } from "#src/lib/problem.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { FactList } from "#src/ui/facts.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

/** Who is signed in, and the ways out. */
export function PersonMenu() {
  const { user, team } = useSession();
  const [open, setOpen] = useState(false);
  const client = useQueryClient();
  const navigate = useNavigate();
  const leave = useMutation({
    mutationFn: (end: () => Promise<undefined>) => end(),
    onSuccess: () => {
      // Nothing of this person's stays behind in the browser's memory.
      client.clear();
      client.setQueryData(sessionQuery.queryKey, null);
      navigate(paths.signIn, { replace: true });
    },
  });
  return (
    <>
      <Button weight="quiet" onClick={() => setOpen(true)} aria-haspopup="dialog">
        <span className="max-xl:hidden">{user.name ?? user.email}</span>
        <span className="xl:hidden">{user.role}</span>
      </Button>
      {open && (
        <Dialog title="Signed in" onClose={() => setOpen(false)}>
          <FactList
            facts={[
              { label: "E-mail", value: user.email },
              { label: "Role", value: user.role },
              { label: "Team", value: team.name },
            ]}
          />
          <div className="pt-3 lg:hidden">
            <SheetSwitch />
          </div>
          {leave.error && <ProblemNotice problem={asProblem(leave.error)} />}
          <Actions>
            <Button weight="main" disabled={leave.isPending} onClick={() => leave.mutate(endSession)}>
              Sign out
            </Button>
            <Button disabled={leave.isPending} onClick={() => leave.mutate(endAllSessions)}>
              Sign out everywhere
            </Button>
          </Actions>
        </Dialog>
      )}
    </>
  );
}
