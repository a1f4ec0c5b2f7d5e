import { PROFILES } from "#src/features/documents/kinds.ts";
import { ProfileSheet } from "#src/features/profiles/profile-sheet.tsx";
import { DocumentPage } from "#src/routes/document-page.tsx";

export function ProfilePage() {
  return <DocumentPage kind={PROFILES}>{({ document }) => <ProfileSheet profile={document} />}</DocumentPage>;
}
