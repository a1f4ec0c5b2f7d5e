import { useQuery } from "@tanstack/react-query";
import { useNavigate } from "react-router-dom";
import type { DocumentSummary } from "#shared/contract/documents.ts";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { DocumentTable } from "#src/features/documents/document-table.tsx";
import { ImportButton } from "#src/features/documents/import-button.tsx";
import { type DocumentKind, documentsQuery, MACHINES } from "#src/features/documents/kinds.ts";
import { MACHINE_COLUMNS } from "#src/features/machines/machine-columns.tsx";
import { POLYMER_COLUMNS } from "#src/features/polymers/polymer-columns.tsx";
import { profileColumns } from "#src/features/profiles/profile-columns.tsx";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { ButtonLink } from "#src/ui/button.tsx";
import { PageHead } from "#src/ui/section.tsx";
import { Empty, Loaded } from "#src/ui/states.tsx";
import type { Column } from "#src/ui/table.tsx";

const INTRODUCTIONS: Record<string, string> = {
  machines:
    "What each printer can do: its motion limits, its fans and heaters with the commands that drive them, its pauses.",
  profiles: "Heating and cooling rules by height: what a layer shall become, and how fan and heater bring it about.",
  polymers: "Cards of materials: transition temperatures and what else decides state, each number with its source.",
};

export function DocumentsPage<D extends { name: string }>({ kind }: { kind: DocumentKind<D> }) {
  const title = kind.plural[0].toUpperCase() + kind.plural.slice(1);
  usePageTitle(title);
  const may = useMay();
  const navigate = useNavigate();
  const query = useQuery(documentsQuery(kind));
  const columns = useColumns(kind.plural);
  const actions = may("edit") && (
    <>
      <ImportButton kind={kind} onImported={({ id }) => navigate(paths.document(kind.plural, id))} />
      <ButtonLink weight="main" to={paths.newDocument(kind.plural)}>
        New {kind.noun}
      </ButtonLink>
    </>
  );
  return (
    <>
      <PageHead title={title} note={INTRODUCTIONS[kind.plural]} actions={actions} />
      <Loaded query={query} what={`Looking for ${kind.plural}`}>
        {(documents) =>
          documents.length === 0 ? (
            <Empty actions={actions}>There is no {kind.noun} yet.</Empty>
          ) : (
            <DocumentTable
              label={title}
              documents={documents}
              hrefOf={({ id }) => paths.document(kind.plural, id)}
              columns={columns}
            />
          )
        }
      </Loaded>
    </>
  );
}

/** Beside its name and latest version, what one wants to know of this kind of document. */
function useColumns(plural: string): readonly Column<DocumentSummary>[] {
  const machines = useQuery({ ...documentsQuery(MACHINES), enabled: plural === "profiles" });
  if (plural === "profiles") return profileColumns(machines.data ?? []);
  return plural === "machines" ? MACHINE_COLUMNS : POLYMER_COLUMNS;
}
