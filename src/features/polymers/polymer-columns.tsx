import type { DocumentSummary } from "#shared/contract/documents.ts";
import type { PolymerGist } from "#shared/contract/gists.ts";
import { fixedText } from "#src/lib/number-text.ts";
import type { Column } from "#src/ui/table.tsx";

/** What tells polymers apart in a list: their transitions, and which states are within reach. */
export const POLYMER_COLUMNS: Column<DocumentSummary>[] = [
  { head: "Tg", unit: "°C", number: true, cell: ({ polymer }) => polymer && fixedText(polymer.tgC, 0) },
  { head: "Tm", unit: "°C", number: true, cell: ({ polymer }) => tmText(polymer) },
  { head: "Within reach", cell: ({ polymer }) => polymer && reachText(polymer) },
];

const tmText = (polymer: PolymerGist | undefined): string =>
  polymer?.tmC === undefined ? "none" : fixedText(polymer.tmC, 0);

function reachText({ tmC, amorphousReachable }: PolymerGist): string {
  if (tmC === undefined) return "amorphous only";
  return amorphousReachable ? "amorphous, semi-crystalline" : "semi-crystalline only";
}
