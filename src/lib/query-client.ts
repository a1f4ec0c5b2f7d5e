import { QueryClient } from "@tanstack/react-query";
import { ProblemError } from "#src/lib/problem.ts";

/** Only what may pass by itself is tried again: no answer, or a server that is starting. */
function mayPass(error: unknown): boolean {
  return error instanceof ProblemError && (error.problem.status === 0 || error.problem.status >= 502);
}

export function makeQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        retry: (failures, error) => failures < 2 && mayPass(error),
        staleTime: 10_000,
        // Without a network a page says so instead of waiting without a word.
        networkMode: "always",
      },
      mutations: { retry: false, networkMode: "always" },
    },
  });
}
