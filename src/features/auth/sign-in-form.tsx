import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type FormEvent, useState } from "react";
import type { Session } from "#shared/contract/session.ts";
import { sessionQuery, startSession } from "#src/features/auth/queries.ts";
import { asProblem } from "#src/lib/problem.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions } from "#src/ui/dialog.tsx";
import { TextField } from "#src/ui/field.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

interface Props {
  /** set when the same person signs in again; the address can't be changed then */
  email?: string;
  onSignedIn(session: Session): void;
}

export function SignInForm({ email: fixedEmail, onSignedIn }: Props) {
  const client = useQueryClient();
  const [email, setEmail] = useState(fixedEmail ?? "");
  const [password, setPassword] = useState("");
  const signIn = useMutation({
    mutationFn: startSession,
    onSuccess: (session) => {
      client.setQueryData(sessionQuery.queryKey, session);
      onSignedIn(session);
    },
  });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!signIn.isPending) signIn.mutate({ email, password });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        required
        // Signing in is all there is to do on that page.
        autoFocus={fixedEmail === undefined}
        readOnly={fixedEmail !== undefined}
        value={email}
        onChange={(event) => setEmail(event.target.value)}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="current-password"
        required
        value={password}
        onChange={(event) => setPassword(event.target.value)}
      />
      {signIn.error && <ProblemNotice problem={asProblem(signIn.error)} />}
      <Actions>
        <Button weight="main" type="submit" disabled={signIn.isPending}>
          {signIn.isPending ? "Signing in …" : "Sign in"}
        </Button>
      </Actions>
    </form>
  );
}
