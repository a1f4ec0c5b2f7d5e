import type { Polymer } from "#shared/formats/polymer.ts";
import { POLYMERS } from "#src/features/documents/kinds.ts";
import { newPolymer } from "#src/features/polymers/new-polymer.ts";
import { PolymerEditor } from "#src/features/polymers/polymer-editor.tsx";
import { EditPage, NewPage } from "#src/routes/edit-page.tsx";

const editor = (polymer: Polymer, onChange: (polymer: Polymer) => void) => (
  <PolymerEditor polymer={polymer} onChange={onChange} />
);

export const EditPolymer = () => <EditPage kind={POLYMERS} editor={editor} />;
export const NewPolymer = () => <NewPage kind={POLYMERS} start={newPolymer} editor={editor} />;
