import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type ReactNode, useRef, useState } from "react";
import { useNavigate } from "react-router-dom";
import type { Profile } from "#shared/formats/profile.ts";
import { paths } from "#src/app/paths.ts";
import { ConflictNotice } from "#src/features/documents/conflict-notice.tsx";
import { PROFILES, type Version } from "#src/features/documents/kinds.ts";
import { SaveDialog } from "#src/features/documents/save-dialog.tsx";
import { writeTuning } from "#src/features/tunings/queries.ts";
import { asProblem, isProblem } from "#src/lib/problem.ts";
import { type Remark, SEVERITY_NAMES } from "#src/lib/remarks.ts";
import type { Draft } from "#src/lib/use-draft.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

interface Props {
  readingId: string;
  /** the version that was chosen */
  profile: Version<Profile>;
  /** what has become of it here */
  draft: Draft<Profile>;
  /** the draft once it has no problem */
  checked: Profile | undefined;
  /** a plan could be made */
  ready: boolean;
  /** warnings among them are told again before the file is written */
  remarks?: readonly Remark[];
  /** stands beside the button: why nothing can be written yet */
  unfit?: ReactNode;
}

/** Writes the tuned file. A profile that was changed here becomes a version first: a file is never made from less. */
export function WriteTuned({ readingId, profile, draft, checked, ready, remarks = [], unfit }: Props) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const [asking, setAsking] = useState(false);
  const saved = useRef<{ document: Profile; number: number }>(undefined);
  const write = useMutation({
    mutationFn: async (note: string | undefined) => {
      if (!draft.changed) return writeTuning(readingId, profile.id, profile.number);
      if (!checked) throw new Error("The profile is not complete.");
      // Tried again after the version was saved and only the rest failed, it must not be saved twice.
      if (saved.current?.document !== draft.document) {
        const { number } = await PROFILES.createVersion(profile.id, draft.basedOn, checked, note);
        saved.current = { document: draft.document, number };
        draft.rebase(number);
      }
      return writeTuning(readingId, profile.id, saved.current.number);
    },
    onSuccess: ({ id }) => {
      draft.discard();
      client.invalidateQueries({ queryKey: [PROFILES.plural] });
      client.invalidateQueries({ queryKey: ["tunings"] });
      navigate(paths.tuning(id));
    },
  });
  const warnings = remarks.filter(({ severity }) => severity === "warning");
  const conflict = isProblem(write.error, "version-conflict");
  const fault = write.error && !conflict && <ProblemNotice problem={asProblem(write.error)} />;
  return (
    <div className="flex flex-col gap-3 bg-paper pb-4 xl:pt-2">
      {conflict && (
        <ConflictNotice
          kind={PROFILES}
          id={profile.id}
          draft={draft.document}
          basedOn={draft.basedOn}
          onRebase={(latest) => {
            draft.rebase(latest);
            write.reset();
          }}
        />
      )}
      {!asking && fault}
      <div className="flex flex-wrap items-center gap-3">
        <Button
          weight="main"
          disabled={!ready || write.isPending}
          onClick={() => (draft.changed || warnings.length > 0 ? setAsking(true) : write.mutate(undefined))}
        >
          {write.isPending ? "Handing it over …" : "Write tuned file"}
        </Button>
        {draft.changed && <Button onClick={draft.discard}>Discard changes</Button>}
        {unfit}
        <p className="text-small text-soft">
          {!ready && !draft.changed
            ? ""
            : draft.changed
              ? `Changed from version ${profile.number}: it is saved as version ${draft.basedOn + 1} first, and the file is for trials until that is approved.`
              : profile.approvedAt
                ? "With an approved version."
                : "This version is not approved: the file is for trials only."}
        </p>
      </div>
      {asking && !conflict && !draft.changed && (
        <Dialog
          title="Before the file is written"
          onClose={() => {
            setAsking(false);
            write.reset();
          }}
        >
          <Warnings warnings={warnings} />
          {fault}
          <Actions>
            <Button weight="main" disabled={write.isPending} onClick={() => write.mutate(undefined)}>
              Write tuned file
            </Button>
            <Button onClick={() => setAsking(false)}>Go back</Button>
          </Actions>
        </Dialog>
      )}
      {asking && !conflict && draft.changed && (
        <SaveDialog
          title="Save the changed profile, then write"
          action="Write tuned file"
          pending={write.isPending}
          fault={fault}
          onSave={(note) => write.mutate(note)}
          onClose={() => {
            setAsking(false);
            write.reset();
          }}
        >
          <p>
            <span className="font-semibold">{draft.document.name}</span> becomes version {draft.basedOn + 1}.
          </p>
          <Warnings warnings={warnings} />
        </SaveDialog>
      )}
    </div>
  );
}

function Warnings({ warnings }: { warnings: readonly Remark[] }) {
  if (warnings.length === 0) return null;
  return (
    <ul aria-label="Warnings" className="flex flex-col gap-2">
      {warnings.map(({ message, layer }) => (
        <li key={`${layer} ${message}`} className="border-l-2 border-ink pl-2">
          <span className="font-semibold">{SEVERITY_NAMES.warning}</span> {message}
        </li>
      ))}
    </ul>
  );
}
