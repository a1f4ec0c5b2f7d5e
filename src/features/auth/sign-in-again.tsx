import { useSession } from "#src/features/auth/session-context.tsx";
import { SignInForm } from "#src/features/auth/sign-in-form.tsx";
import { settleSignIn, useSignInWanted } from "#src/lib/sign-in-gate.ts";
import { Dialog } from "#src/ui/dialog.tsx";

/** Over the page when the session has ended. The page stays as it is, with everything typed into it. */
export function SignInAgain() {
  const wanted = useSignInWanted();
  const { user } = useSession();
  if (!wanted) return null;
  return (
    <Dialog title="Sign in again" onClose={() => settleSignIn(false)}>
      <p className="mb-4">
        Your session has ended. Nothing on this page is lost: sign in, and what you were doing goes on.
      </p>
      <SignInForm email={user.email} onSignedIn={() => settleSignIn(true)} />
    </Dialog>
  );
}
