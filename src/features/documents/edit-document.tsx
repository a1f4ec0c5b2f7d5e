import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type ReactNode, useState } from "react";
import type { Problem } from "#shared/formats/problems.ts";
import { ConflictNotice } from "#src/features/documents/conflict-notice.tsx";
import type { DocumentKind, Version } from "#src/features/documents/kinds.ts";
import { SaveDialog } from "#src/features/documents/save-dialog.tsx";
import { findProblems } from "#src/lib/document-problems.ts";
import { moment } from "#src/lib/format.ts";
import { placeOf, placeText } from "#src/lib/place.ts";
import { asProblem, isProblem } from "#src/lib/problem.ts";
import { useDraft } from "#src/lib/use-draft.ts";
import { Button } from "#src/ui/button.tsx";
import { Notice, ProblemNotice } from "#src/ui/notice.tsx";
import { problemText } from "#src/ui/number-field.tsx";

interface Props<D extends { name: string }> {
  kind: DocumentKind<D>;
  /** the version to begin from; a number of 0 stands for a document that is new */
  base: { id?: string; number: number; document: D };
  editor(draft: D, change: (draft: D) => void): ReactNode;
  onSaved(version: Version<D>): void;
}

/** Edits a document and saves it as its next version. What is not saved yet is kept in this browser. */
export function EditDocument<D extends { name: string }>({ kind, base, editor, onSaved }: Props<D>) {
  const client = useQueryClient();
  const draft = useDraft(`${kind.plural}.${base.id ?? "new"}`, base);
  const [asking, setAsking] = useState(false);
  const isNew = base.id === undefined;
  const save = useMutation({
    mutationFn: (note: string | undefined) => {
      const document = kind.parse(draft.document);
      return base.id === undefined
        ? kind.create(document, note)
        : kind.createVersion(base.id, draft.basedOn, document, note);
    },
    onSuccess: (version) => {
      draft.discard();
      client.invalidateQueries({ queryKey: [kind.plural] });
      onSaved(version);
    },
  });
  const fault = save.error && !isProblem(save.error, "version-conflict") ? asProblem(save.error) : undefined;
  const [tried, setTried] = useState(false);
  // Of a document that is new nobody has to hear what is missing before they try to save it.
  const { problems } = findProblems(kind.schema, draft.document);
  const wrong = problems.all.length > 0;
  return (
    <>
      {draft.resumedFrom && (
        <div className="pb-4">
          <Notice kind="note" actions={<Button onClick={draft.discard}>Discard them</Button>}>
            These are your changes from {moment(draft.resumedFrom)}, not saved yet.
          </Notice>
        </div>
      )}
      {editor(draft.document, draft.change)}
      <div className="sticky bottom-0 mt-6 flex flex-col gap-3 border-t border-ink bg-paper py-3">
        {wrong && (isNew ? tried : draft.changed) && (
          <ToCorrect problems={problems.all} document={draft.document} noun={kind.noun} />
        )}
        {save.error && !fault && base.id !== undefined && (
          <ConflictNotice
            kind={kind}
            id={base.id}
            draft={draft.document}
            basedOn={draft.basedOn}
            onRebase={(latest) => {
              draft.rebase(latest);
              save.reset();
            }}
          />
        )}
        <div className="flex flex-wrap items-center gap-3">
          <Button
            weight="main"
            disabled={isNew ? wrong && tried : wrong || !draft.changed}
            onClick={() => (wrong ? setTried(true) : setAsking(true))}
          >
            {isNew ? "Save" : "Save as a new version"}
          </Button>
          <Button disabled={!draft.changed} onClick={draft.discard}>
            Discard changes
          </Button>
          <p className="text-small text-soft">
            {draft.changed ? "Not saved yet; kept in this browser." : isNew ? "" : `As in version ${base.number}.`}
          </p>
        </div>
      </div>
      {asking && !isProblem(save.error, "version-conflict") && (
        <SaveDialog
          title={isNew ? `Save the ${kind.noun}` : "Save as a new version"}
          action="Save"
          pending={save.isPending}
          fault={fault && <ProblemNotice problem={fault} />}
          onSave={(note) => save.mutate(note)}
          onClose={() => {
            setAsking(false);
            save.reset();
          }}
        />
      )}
    </>
  );
}

/** Problems named here; each also stands at its field. */
const MOST_NAMED = 3;

function ToCorrect({ problems, document, noun }: { problems: readonly Problem[]; document: unknown; noun: string }) {
  const rest = problems.length - MOST_NAMED;
  return (
    <Notice kind="fault" title={`The ${noun} can't be saved yet`}>
      <ul>
        {problems.slice(0, MOST_NAMED).map(({ path, message }) => (
          <li key={path + message}>{problemText(placeText(placeOf(path, document)), message)}</li>
        ))}
        {rest > 0 && <li>{`And ${rest} more, each said at its field.`}</li>}
      </ul>
    </Notice>
  );
}
