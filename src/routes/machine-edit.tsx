import type { Machine } from "#shared/formats/machine.ts";
import { MACHINES } from "#src/features/documents/kinds.ts";
import { MachineEditor } from "#src/features/machines/editor/machine-editor.tsx";
import { newMachine } from "#src/features/machines/editor/machine-edits.ts";
import { EditPage, NewPage } from "#src/routes/edit-page.tsx";

const editor = (machine: Machine, onChange: (machine: Machine) => void) => (
  <MachineEditor machine={machine} onChange={onChange} />
);

export const EditMachine = () => <EditPage kind={MACHINES} editor={editor} />;
export const NewMachine = () => <NewPage kind={MACHINES} start={newMachine} editor={editor} />;
