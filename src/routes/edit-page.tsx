import { useQuery } from "@tanstack/react-query";
import { type ReactNode, useState } from "react";
import { useNavigate, useParams } from "react-router-dom";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { EditDocument } from "#src/features/documents/edit-document.tsx";
import { type DocumentKind, historyQuery, versionQuery } from "#src/features/documents/kinds.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { ButtonLink } from "#src/ui/button.tsx";
import { Notice } from "#src/ui/notice.tsx";
import { PageHead } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

interface EditorProps<D extends { name: string }> {
  kind: DocumentKind<D>;
  editor(draft: D, change: (draft: D) => void): ReactNode;
}

/** Edits the latest version of a document. */
export function EditPage<D extends { name: string }>({ kind, editor }: EditorProps<D>) {
  const { id = "" } = useParams();
  const history = useQuery(historyQuery(kind, id));
  usePageTitle(`${history.data?.name ?? kind.noun}, edit`);
  return (
    <Loaded query={history} what={`Looking for the ${kind.noun}`}>
      {({ versions }) => <EditVersion key={id} kind={kind} id={id} latest={versions[0].number} editor={editor} />}
    </Loaded>
  );
}

function EditVersion<D extends { name: string }>({
  kind,
  id,
  latest,
  editor,
}: EditorProps<D> & { id: string; latest: number }) {
  // A version that somebody else saves meanwhile must not exchange what one is editing.
  const [begun] = useState(latest);
  const version = useQuery(versionQuery(kind, id, begun));
  const navigate = useNavigate();
  return (
    <Loaded query={version} what="Fetching the version">
      {({ number, document }) => (
        <>
          <PageHead
            kind={`Edit the ${kind.noun}`}
            title={document.name}
            actions={<ButtonLink to={paths.document(kind.plural, id)}>Back without saving</ButtonLink>}
          />
          <MayEdit>
            <EditDocument
              kind={kind}
              base={{ id, number, document }}
              editor={editor}
              onSaved={() => navigate(paths.document(kind.plural, id))}
            />
          </MayEdit>
        </>
      )}
    </Loaded>
  );
}

/** Writes a document that is new. */
export function NewPage<D extends { name: string }>({ kind, start, editor }: EditorProps<D> & { start(): D }) {
  const navigate = useNavigate();
  const [document] = useState(start);
  usePageTitle(`New ${kind.noun}`);
  return (
    <>
      <PageHead
        title={`New ${kind.noun}`}
        note="What is filled in is only there to begin with. Go through every value before you save."
        actions={<ButtonLink to={paths.documents(kind.plural)}>Back without saving</ButtonLink>}
      />
      <MayEdit>
        <EditDocument
          kind={kind}
          base={{ number: 0, document }}
          editor={editor}
          onSaved={({ id }) => navigate(paths.document(kind.plural, id))}
        />
      </MayEdit>
    </>
  );
}

/** A link may lead here whoever follows it. */
function MayEdit({ children }: { children: ReactNode }) {
  const may = useMay();
  if (may("edit")) return children;
  return (
    <Notice kind="note" title="Editing is for engineers">
      Your role may look at it. Ask an engineer or the lead of your team for a change.
    </Notice>
  );
}
