import { type FormEvent, type ReactNode, useState } from "react";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { TextArea } from "#src/ui/field.tsx";

interface Props {
  title: string;
  action: string;
  pending: boolean;
  /** what went wrong, and what can be done about it */
  fault?: ReactNode;
  initialNote?: string;
  children?: ReactNode;
  onSave(note: string | undefined): void;
  onClose(): void;
}

/** Asks why a version is made; whoever looks at it a year later will want to know. */
export function SaveDialog({ title, action, pending, fault, initialNote = "", children, onSave, onClose }: Props) {
  const [note, setNote] = useState(initialNote);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    onSave(note.trim() === "" ? undefined : note.trim());
  };
  return (
    <Dialog title={title} onClose={onClose}>
      <form onSubmit={submit} className="flex flex-col gap-4">
        {children}
        <TextArea
          label="Why"
          hint="What changed and for what reason, for whoever looks at this version later."
          maxLength={2_000}
          value={note}
          onChange={({ target }) => setNote(target.value)}
        />
        {fault}
        <Actions>
          <Button weight="main" type="submit" disabled={pending}>
            {pending ? "Saving …" : action}
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </Actions>
      </form>
    </Dialog>
  );
}
