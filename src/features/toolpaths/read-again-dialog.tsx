import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type FormEvent, useState } from "react";
import type { DocumentSummary } from "#shared/contract/documents.ts";
import type { Reading } from "#shared/contract/toolpaths.ts";
import { readAgain } from "#src/features/toolpaths/queries.ts";
import { asProblem } from "#src/lib/problem.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { SelectField } from "#src/ui/field.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

interface Props {
  toolpathId: string;
  machines: readonly DocumentSummary[];
  /** the machine whose reading is looked at: another one is offered first */
  current?: string;
  onRead(reading: Reading): void;
  onClose(): void;
}

/** Layer times depend on the machine: the same file, read with the limits of another one. */
export function ReadAgainDialog({ toolpathId, machines, current, onRead, onClose }: Props) {
  const client = useQueryClient();
  const [machineId, setMachineId] = useState((machines.find(({ id }) => id !== current) ?? machines[0])?.id ?? "");
  const machine = machines.find(({ id }) => id === machineId);
  const [number, setNumber] = useState<number>();
  const version = number ?? machine?.latest.number ?? 1;
  const read = useMutation({
    mutationFn: () => readAgain(toolpathId, machineId, version),
    onSuccess: (reading) => {
      client.invalidateQueries({ queryKey: ["toolpaths"] });
      onRead(reading);
    },
  });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    read.mutate();
  };
  return (
    <Dialog title="Read for another machine" onClose={onClose}>
      <form onSubmit={submit} className="flex flex-col gap-4">
        <p>Layer times depend on the machine's limits. The readings made before stay as they are.</p>
        <SelectField
          label="Machine"
          value={machineId}
          onChange={({ target }) => {
            setMachineId(target.value);
            setNumber(undefined);
          }}
        >
          {machines.map(({ id, name }) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </SelectField>
        <SelectField label="Version" value={version} onChange={({ target }) => setNumber(Number(target.value))}>
          {versionNumbers(machine).map((each) => (
            <option key={each} value={each}>
              {each}
              {each === machine?.latest.number ? ", the latest" : ""}
            </option>
          ))}
        </SelectField>
        {read.error && <ProblemNotice problem={asProblem(read.error)} />}
        <Actions>
          <Button weight="main" type="submit" disabled={read.isPending || !machine}>
            Read
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </Actions>
      </form>
    </Dialog>
  );
}

/** Versions are numbered without gaps, the latest first. */
function versionNumbers(machine: DocumentSummary | undefined): number[] {
  return Array.from({ length: machine?.latest.number ?? 0 }, (_, i) => (machine?.latest.number ?? 0) - i);
}
