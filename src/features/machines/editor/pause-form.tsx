import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import { Button } from "#src/ui/button.tsx";
import { CheckField, TextField } from "#src/ui/field.tsx";
import { problemText } from "#src/ui/number-field.tsx";

/** Commands that stop the print. Only after a blocking one may the heater be restored. */
export function PauseForm({ editing: { machine, problems, edit, rest } }: { editing: MachineEditing }) {
  const { pauses } = machine;
  return (
    <div className="flex flex-col gap-3">
      {pauses.map((pause, p) => (
        <fieldset
          // biome-ignore lint/suspicious/noArrayIndexKey: a pause is its place in the list
          key={p}
          className="grid items-start gap-3 border-b border-hair pb-3 sm:grid-cols-[12rem_minmax(0,1fr)_auto]"
        >
          <legend className="sr-only">{`Pause ${pause.command}`}</legend>
          <TextField
            label="Command"
            className="[&_input]:font-mono"
            value={pause.command}
            error={problemText("Command", problems.at(`pauses[${p}].command`) ?? problems.at(`pauses[${p}]`))}
            onChange={({ target }) =>
              edit(
                { ...machine, pauses: pauses.map((each, i) => (i === p ? { ...each, command: target.value } : each)) },
                `pauses[${p}]`,
              )
            }
            onBlur={rest}
          />
          <CheckField
            className="sm:pt-7"
            label="No further line is read until the print goes on, so the lamp may be restored after it"
            checked={pause.blocking}
            onChange={({ target }) =>
              edit({
                ...machine,
                pauses: pauses.map((each, i) => (i === p ? { ...each, blocking: target.checked } : each)),
              })
            }
          />
          <Button
            className="sm:mt-6"
            aria-label={`Remove pause ${pause.command}`}
            onClick={() => edit({ ...machine, pauses: pauses.filter((_, i) => i !== p) })}
          >
            Remove
          </Button>
        </fieldset>
      ))}
      <span>
        <Button onClick={() => edit({ ...machine, pauses: [...pauses, { command: "", blocking: false }] })}>
          Add a pause
        </Button>
      </span>
    </div>
  );
}
