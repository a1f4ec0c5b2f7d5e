import { createContext, type ReactNode, useContext } from "react";
import { may, type Permission } from "#shared/contract/roles.ts";
import type { Session } from "#shared/contract/session.ts";

const Context = createContext<Session | null>(null);

export function SessionProvider({ session, children }: { session: Session; children: ReactNode }) {
  return <Context value={session}>{children}</Context>;
}

export function useSession(): Session {
  const session = useContext(Context);
  if (!session) throw new Error("This page needs somebody who is signed in.");
  return session;
}

/** Whether the person may do something; what they may not is not offered to them. */
export function useMay(): (permission: Permission) => boolean {
  const { user } = useSession();
  return (permission) => may(user.role, permission);
}
