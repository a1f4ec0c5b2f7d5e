import { z } from "zod";
import { Email, Id } from "#shared/contract/common.ts";
import { endpoint } from "#shared/contract/endpoint.ts";
import { Role } from "#shared/contract/roles.ts";

/** Who is signed in, and for which team. */
export const Session = z.object({
  user: z.object({ id: Id, email: z.string(), name: z.string().optional(), role: Role }),
  team: z.object({ id: Id, name: z.string() }),
});
export type Session = z.infer<typeof Session>;

export const Credentials = z.object({
  email: Email,
  password: z.string().min(1, { error: "is empty" }).max(256, { error: "is longer than 256 characters" }),
});
export type Credentials = z.input<typeof Credentials>;

/** 401 `wrong-credentials`, 429 `too-many-attempts` */
export const signIn = endpoint({
  method: "POST",
  path: "/api/session",
  allows: "anyone",
  body: Credentials,
  reply: Session,
});

export const getSession = endpoint({ method: "GET", path: "/api/session", allows: "read", reply: Session });

export const signOut = endpoint({ method: "DELETE", path: "/api/session", allows: "anyone", reply: "nothing" });

/** Ends this and every other session of the same person. */
export const signOutEverywhere = endpoint({
  method: "DELETE",
  path: "/api/sessions",
  allows: "read",
  reply: "nothing",
});
