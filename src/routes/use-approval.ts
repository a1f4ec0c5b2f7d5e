import { useMutation, useQueryClient } from "@tanstack/react-query";
import { approveProfile, type DocumentKind } from "#src/features/documents/kinds.ts";

/** Approves a version of a profile for parts that ship. */
export function useApproval<D extends { name: string }>(kind: DocumentKind<D>, id: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (number: number) => approveProfile(id, number),
    onSuccess: () => client.invalidateQueries({ queryKey: [kind.plural] }),
  });
}
