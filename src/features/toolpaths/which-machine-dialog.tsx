import type { DocumentSummary } from "#shared/contract/documents.ts";
import { counted } from "#src/lib/format.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";

interface Props {
  files: readonly File[];
  machines: readonly DocumentSummary[];
  onChoose(machineId: string): void;
  onClose(): void;
}

/** Asked when files come in and no machine was chosen: a guess would give layer times of another machine. */
export function WhichMachineDialog({ files, machines, onChoose, onClose }: Props) {
  const what = files.length === 1 ? files[0].name : counted(files.length, "file");
  return (
    <Dialog title="For which machine?" onClose={onClose}>
      <p>
        <span className="font-semibold wrap-anywhere">{what}</span> is read with the limits of one machine, and tuned
        for its fans and heaters. You can read it again for another.
      </p>
      <Actions>
        {machines.map(({ id, name }) => (
          <Button key={id} onClick={() => onChoose(id)}>
            {name}
          </Button>
        ))}
      </Actions>
    </Dialog>
  );
}
