import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { DifferenceTable } from "#src/features/documents/difference-table.tsx";
import { type DocumentKind, historyQuery, versionQuery } from "#src/features/documents/kinds.ts";
import { Button } from "#src/ui/button.tsx";
import { Dialog } from "#src/ui/dialog.tsx";
import { Notice } from "#src/ui/notice.tsx";
import { Loaded } from "#src/ui/states.tsx";

interface Props<D extends { name: string }> {
  kind: DocumentKind<D>;
  id: string;
  draft: D;
  basedOn: number;
  /** keeps the draft, as a change of the version that is the latest now */
  onRebase(latest: number): void;
}

/** Somebody else has saved a version since the draft was begun. Nothing is lost: look at both, then decide. */
export function ConflictNotice<D extends { name: string }>({ kind, id, draft, basedOn, onRebase }: Props<D>) {
  const [comparing, setComparing] = useState(false);
  const history = useQuery({ ...historyQuery(kind, id), staleTime: 0 });
  return (
    <Loaded query={history} what="Looking for the newer version">
      {({ versions: [latest] }) => (
        <Notice
          kind="caution"
          title={`${latest.createdBy} has saved version ${latest.number} since`}
          actions={
            <>
              <Button onClick={() => setComparing(true)}>Compare with yours</Button>
              <Button onClick={() => onRebase(latest.number)}>Put yours on top of it</Button>
            </>
          }
        >
          Yours began from version {basedOn} and is kept. Put on top, it replaces what version {latest.number} changed;
          that version stays in the list.
          {comparing && (
            <Dialog title="Both changes" wide onClose={() => setComparing(false)}>
              <Both kind={kind} id={id} latest={latest.number} draft={draft} />
            </Dialog>
          )}
        </Notice>
      )}
    </Loaded>
  );
}

function Both<D extends { name: string }>({
  kind,
  id,
  latest,
  draft,
}: {
  kind: DocumentKind<D>;
  id: string;
  latest: number;
  draft: D;
}) {
  const query = useQuery(versionQuery(kind, id, latest));
  return (
    <Loaded query={query} what="Fetching the version">
      {({ document }) => (
        <DifferenceTable
          before={{ name: `Version ${latest}`, document }}
          after={{ name: "Yours", document: draft }}
          whole={`The whole ${kind.noun}`}
        />
      )}
    </Loaded>
  );
}
