import { useQuery } from "@tanstack/react-query";
import { Navigate, useLocation } from "react-router-dom";
import { Frame } from "#src/app/frame.tsx";
import { paths } from "#src/app/paths.ts";
import { sessionQuery } from "#src/features/auth/queries.ts";
import { SessionProvider } from "#src/features/auth/session-context.tsx";
import { SignInAgain } from "#src/features/auth/sign-in-again.tsx";
import { Loaded } from "#src/ui/states.tsx";

/** Everything but the sign-in page: who is not signed in is sent there, and back afterwards. */
export function SignedIn() {
  const query = useQuery(sessionQuery);
  const { pathname, search } = useLocation();
  return (
    <Loaded query={query} what="Opening">
      {(session) =>
        session === null ? (
          <Navigate to={paths.signIn} replace state={{ to: pathname + search }} />
        ) : (
          <SessionProvider session={session}>
            <Frame />
            <SignInAgain />
          </SessionProvider>
        )
      }
    </Loaded>
  );
}
