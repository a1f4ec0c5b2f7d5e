import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { useMay } from "#src/features/auth/session-context.tsx";
import { MACHINES } from "#src/features/documents/kinds.ts";
import { Cautions } from "#src/features/machines/cautions.tsx";
import { ChecklistDialog } from "#src/features/machines/checklist-dialog.tsx";
import { MachineSheet } from "#src/features/machines/machine-sheet.tsx";
import { acknowledgementQuery } from "#src/features/machines/queries.ts";
import { moment } from "#src/lib/format.ts";
import { DocumentPage } from "#src/routes/document-page.tsx";
import { Button } from "#src/ui/button.tsx";
import { Section } from "#src/ui/section.tsx";

export function MachinePage() {
  return (
    <DocumentPage kind={MACHINES}>
      {({ id, number, document }) => (
        <>
          <Section title="Cautions" note={<Acknowledged id={id} version={number} name={document.name} />}>
            <Cautions />
          </Section>
          <MachineSheet machine={document} />
        </>
      )}
    </DocumentPage>
  );
}

function Acknowledged({ id, version, name }: { id: string; version: number; name: string }) {
  const may = useMay();
  const { data } = useQuery(acknowledgementQuery(id, version));
  const [open, setOpen] = useState(false);
  if (!data || !may("operate")) return null;
  return (
    <>
      {data.at ? `Your checklist: ${moment(data.at)}` : "Your checklist is open."}
      <br />
      <Button weight="quiet" className="text-small" onClick={() => setOpen(true)}>
        {data.at ? "Look at it" : "Go through it"}
      </Button>
      {open && (
        <ChecklistDialog
          machine={{ id, version, name }}
          onAcknowledged={() => setOpen(false)}
          onClose={() => setOpen(false)}
        />
      )}
    </>
  );
}
