import type { Role } from "#shared/contract/roles.ts";

/** Who makes a request. */
export interface Actor {
  userId: string;
  email: string;
  name: string | null;
  role: Role;
  teamId: string;
  teamName: string;
  sessionId: string;
}

declare global {
  namespace Express {
    interface Request {
      /** who is signed in; set before any route runs */
      actor?: Actor;
    }
  }
}
