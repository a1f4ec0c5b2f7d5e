import { POLYMERS } from "#src/features/documents/kinds.ts";
import { PolymerCard } from "#src/features/polymers/polymer-card.tsx";
import { DocumentPage } from "#src/routes/document-page.tsx";

export function PolymerPage() {
  return <DocumentPage kind={POLYMERS}>{({ document }) => <PolymerCard polymer={document} />}</DocumentPage>;
}
