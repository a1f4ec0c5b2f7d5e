import { useQuery } from "@tanstack/react-query";
import type { Tuning } from "#shared/contract/tunings.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import { documentsQuery, POLYMERS, versionQuery } from "#src/features/documents/kinds.ts";

/** The card a tuning was written with, in that version; undefined until it is here, and where there was none. */
export function usePolymerUsed({ polymerId, polymerVersion }: Pick<Tuning, "polymerId" | "polymerVersion">) {
  const used = polymerId !== undefined && polymerVersion !== undefined;
  const version = useQuery({ ...versionQuery(POLYMERS, polymerId ?? "", polymerVersion ?? 1), enabled: used });
  return used ? version.data?.document : undefined;
}

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
