import { queryOptions } from "@tanstack/react-query";
import {
  type Credentials,
  getSession,
  type Session,
  signIn,
  signOut,
  signOutEverywhere,
} from "#shared/contract/session.ts";
import { call, callOnce } from "#src/lib/call.ts";
import { ProblemError } from "#src/lib/problem.ts";

/** Who is signed in; null when nobody is. */
export const sessionQuery = queryOptions({
  queryKey: ["session"],
  queryFn: async ({ signal }): Promise<Session | null> => {
    try {
      return await callOnce(getSession, { signal });
    } catch (error) {
      if (error instanceof ProblemError && error.problem.status === 401) return null;
      throw error;
    }
  },
  staleTime: 5 * 60_000,
});

export const startSession = (credentials: Credentials): Promise<Session> => call(signIn, { body: credentials });
export const endSession = (): Promise<undefined> => call(signOut);
export const endAllSessions = (): Promise<undefined> => call(signOutEverywhere);
