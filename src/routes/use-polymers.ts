import { useQuery } from "@tanstack/react-query";
import type { Polymer } from "#shared/formats/polymer.ts";
import { documentsQuery, POLYMERS, versionQuery } from "#src/features/documents/kinds.ts";

/** The team's card of a polymer, by the name a profile gives it, and the names of all cards. */
export function usePolymerOf(name: string): { polymer: Polymer | undefined; names: string[] } {
  const list = useQuery(documentsQuery(POLYMERS));
  const plain = (text: string) => text.trim().replace(/\s+/g, " ").toLowerCase();
  const found = list.data?.find((card) => plain(card.name) === plain(name));
  const version = useQuery({
    ...versionQuery(POLYMERS, found?.id ?? "", found?.latest.number ?? 1),
    enabled: found !== undefined,
  });
  return { polymer: found && version.data?.document, names: (list.data ?? []).map((card) => card.name) };
}
