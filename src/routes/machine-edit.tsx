import { MACHINES } from "#src/features/documents/kinds.ts";
import { EditPage, NewPage } from "#src/routes/edit-page.tsx";
export const EditMachine = () => <EditPage kind={MACHINES} editor={() => null} />;
export const NewMachine = () => <NewPage kind={MACHINES} start={() => { throw new Error("later"); }} editor={() => null} />;
