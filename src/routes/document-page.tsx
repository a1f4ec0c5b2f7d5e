import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { type ReactNode, useState } from "react";
import { useNavigate, useParams, useSearchParams } from "react-router-dom";
import type { DocumentHistory } from "#shared/contract/documents.ts";
import { paths } from "#src/app/paths.ts";
import { useMay } from "#src/features/auth/session-context.tsx";
import { type DocumentKind, historyQuery, type Version, versionQuery } from "#src/features/documents/kinds.ts";
import { SaveDialog } from "#src/features/documents/save-dialog.tsx";
import { VersionTable } from "#src/features/documents/version-table.tsx";
import { moment } from "#src/lib/format.ts";
import { asProblem } from "#src/lib/problem.ts";
import { documentFileName, saveFile } from "#src/lib/save-file.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { useApproval } from "#src/routes/use-approval.ts";
import { Button, ButtonLink } from "#src/ui/button.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";
import { PageHead, Section } from "#src/ui/section.tsx";
import { Loaded } from "#src/ui/states.tsx";

interface Props<D extends { name: string }> {
  kind: DocumentKind<D>;
  /** shows what the document says */
  children(version: Version<D>): ReactNode;
}

/** A machine, profile or polymer: the version looked at, and every version there was. */
export function DocumentPage<D extends { name: string }>({ kind, children }: Props<D>) {
  const { id = "" } = useParams();
  const history = useQuery(historyQuery(kind, id));
  usePageTitle(history.data?.name ?? kind.noun);
  return (
    <Loaded query={history} what={`Looking for the ${kind.noun}`}>
      {(found) => (
        <History kind={kind} history={found}>
          {children}
        </History>
      )}
    </Loaded>
  );
}

function History<D extends { name: string }>({ kind, history, children }: Props<D> & { history: DocumentHistory }) {
  const { id, name, versions } = history;
  const [search] = useSearchParams();
  const may = useMay();
  const latest = versions[0].number;
  const shown = versions.find(({ number }) => number === Number(search.get("version")))?.number ?? latest;
  const version = useQuery(versionQuery(kind, id, shown));
  const [restoring, setRestoring] = useState<number>();
  const approve = useApproval(kind, id);
  const withApproval = kind.plural === "profiles";
  const head = versions.find(({ number }) => number === shown);
  return (
    <>
      <PageHead
        kind={kind.noun[0].toUpperCase() + kind.noun.slice(1)}
        title={name}
        note={
          <>
            version <span className="font-mono">{shown}</span>
            {shown === latest ? ", the latest" : ` of ${latest}`}
            {withApproval && (head?.approvedAt ? `, approved ${moment(head.approvedAt)}` : ", not approved")}
          </>
        }
        actions={
          <>
            <Button
              disabled={!version.data}
              onClick={() =>
                version.data &&
                saveFile(
                  documentFileName(version.data.document.name),
                  kind.write(version.data.document, version.data.number),
                )
              }
            >
              Save document (JSON)
            </Button>
            {may("edit") && (
              <ButtonLink weight="main" to={paths.editDocument(kind.plural, id)}>
                Edit
              </ButtonLink>
            )}
          </>
        }
      />
      <Loaded query={version} what="Fetching the version">
        {children}
      </Loaded>
      <Section title="Versions" note="none is ever overwritten">
        <VersionTable
          versions={versions}
          shown={shown}
          hrefOf={(number) => paths.document(kind.plural, id, number)}
          compareHref={(from, to) => paths.compare(kind.plural, id, from, to)}
          onRestore={may("edit") ? setRestoring : undefined}
          onApprove={withApproval && may("approve") ? (number) => approve.mutate(number) : undefined}
          withApproval={withApproval}
        />
        {approve.error && <ProblemNotice problem={asProblem(approve.error)} />}
      </Section>
      {restoring !== undefined && (
        <RestoreDialog kind={kind} id={id} number={restoring} latest={latest} onClose={() => setRestoring(undefined)} />
      )}
    </>
  );
}

interface RestoreProps<D extends { name: string }> {
  kind: DocumentKind<D>;
  id: string;
  number: number;
  latest: number;
  onClose(): void;
}

function RestoreDialog<D extends { name: string }>({ kind, id, number, latest, onClose }: RestoreProps<D>) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const restore = useMutation({
    mutationFn: async (note: string | undefined) => {
      const { document } = await client.fetchQuery(versionQuery(kind, id, number));
      return kind.createVersion(id, latest, document, note);
    },
    onSuccess: () => {
      client.invalidateQueries({ queryKey: [kind.plural] });
      onClose();
      navigate(paths.document(kind.plural, id));
    },
  });
  return (
    <SaveDialog
      title={`Restore version ${number}`}
      action={`Restore as version ${latest + 1}`}
      pending={restore.isPending}
      initialNote={`As in version ${number}`}
      fault={restore.error && <ProblemNotice problem={asProblem(restore.error)} />}
      onSave={(note) => restore.mutate(note)}
      onClose={onClose}
    >
      <p>
        A new version {latest + 1} is made that says what version {number} says. Version {latest} stays in the list.
      </p>
    </SaveDialog>
  );
}
