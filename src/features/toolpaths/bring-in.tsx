import { useRef, useState } from "react";
import type { DocumentSummary } from "#shared/contract/documents.ts";
import type { Reading, Toolpath } from "#shared/contract/toolpaths.ts";
import { useFileDrop } from "#src/features/toolpaths/use-file-drop.ts";
import { type Underway, useUploads } from "#src/features/toolpaths/use-uploads.ts";
import { WhichMachineDialog } from "#src/features/toolpaths/which-machine-dialog.tsx";
import { bytes } from "#src/lib/format.ts";
import { lastMachine, rememberMachine } from "#src/lib/last-machine.ts";
import { Button } from "#src/ui/button.tsx";
import { SelectField } from "#src/ui/field.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";
import { Progress } from "#src/ui/progress.tsx";

interface Props {
  machines: readonly DocumentSummary[];
  /** whose last choice is remembered */
  userId: string;
  onArrived(arrived: { toolpath: Toolpath; reading: Reading }, last: boolean): void;
}

/** Where a toolpath comes in: dropped anywhere on the page, or chosen. */
export function BringIn({ machines, userId, onArrived }: Props) {
  const [machineId, setMachineId] = useState(() => lastMachine(userId, machines) ?? "");
  const { uploads, add, cancel } = useUploads(onArrived);
  const [held, hold] = useState<File[]>([]);
  const input = useRef<HTMLInputElement>(null);
  const choose = (id: string) => {
    setMachineId(id);
    if (id !== "") rememberMachine(userId, id);
  };
  const bring = (files: File[]) => {
    if (machineId === "") hold(files);
    else add(files, machineId);
  };
  const over = useFileDrop(bring, true);
  const machineName = machines.find(({ id }) => id === machineId)?.name;
  return (
    <>
      <div className="flex flex-wrap items-center gap-x-6 gap-y-3 border border-dashed border-rule bg-sheet px-5 py-4">
        <div className="min-w-60 grow">
          <p className="text-lead">Drop a toolpath anywhere on this page.</p>
          <p className="text-small text-soft">
            Sliced G-code, as text or packed with gzip. It is read for the machine chosen here; you can read it again
            for another.
          </p>
        </div>
        <SelectField label="Machine" className="w-44" value={machineId} onChange={({ target }) => choose(target.value)}>
          {machineId === "" && <option value="">Choose …</option>}
          {machines.map(({ id, name }) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </SelectField>
        <Button weight="main" className="self-end" onClick={() => input.current?.click()}>
          Choose a file
        </Button>
        <input
          ref={input}
          type="file"
          multiple
          accept=".gcode,.gco,.g,.nc,.gz,text/plain"
          className="hidden"
          aria-label="Toolpath files"
          onChange={({ target }) => {
            bring([...(target.files ?? [])]);
            target.value = "";
          }}
        />
      </div>
      {uploads.length > 0 && (
        <ul className="mt-4 flex flex-col gap-4">
          {uploads.map((upload) => (
            <li key={upload.key}>
              <UploadLine upload={upload} onCancel={() => cancel(upload.key)} />
            </li>
          ))}
        </ul>
      )}
      {over && (
        <div className="pointer-events-none fixed inset-0 z-20 grid place-items-center border-4 border-dashed border-ink bg-paper/85">
          <p className="text-title font-semibold">
            {machineName ? `Let go to read it for ${machineName}` : "Let go, then say for which machine"}
          </p>
        </div>
      )}
      {held.length > 0 && (
        <WhichMachineDialog
          files={held}
          machines={machines}
          onChoose={(id) => {
            choose(id);
            add(held, id);
            hold([]);
          }}
          onClose={() => hold([])}
        />
      )}
    </>
  );
}

function UploadLine({ upload: { file, sent, problem }, onCancel }: { upload: Underway; onCancel(): void }) {
  if (problem) {
    return (
      <ProblemNotice
        problem={{ ...problem, title: `${file.name}: ${problem.title}` }}
        actions={<Button onClick={onCancel}>Close</Button>}
      />
    );
  }
  return (
    <Progress
      label={`Sending ${file.name}`}
      share={file.size > 0 ? sent / file.size : 0}
      detail={sent >= file.size ? "sent, being checked" : `${bytes(sent)} of ${bytes(file.size)}`}
      onCancel={onCancel}
    />
  );
}
