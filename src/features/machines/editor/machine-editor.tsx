import { type KeyboardEvent, useMemo } from "react";
import { SAFETY_CHECKLIST } from "#shared/contract/safety-checklist.ts";
import { Machine } from "#shared/formats/machine.ts";
import { ChannelForm } from "#src/features/machines/editor/channel-form.tsx";
import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import { channelAdded } from "#src/features/machines/editor/machine-edits.ts";
import { MotionForm } from "#src/features/machines/editor/motion-form.tsx";
import { PauseForm } from "#src/features/machines/editor/pause-form.tsx";
import { ThermalForm } from "#src/features/machines/editor/thermal-form.tsx";
import { findProblems } from "#src/lib/document-problems.ts";
import { placeOf, placeText } from "#src/lib/place.ts";
import { undoKeys } from "#src/lib/undo-keys.ts";
import { useHistory } from "#src/lib/use-history.ts";
import { Button } from "#src/ui/button.tsx";
import { TextField } from "#src/ui/field.tsx";
import { problemText } from "#src/ui/number-field.tsx";
import { Section } from "#src/ui/section.tsx";

export interface MachineEditorProps {
  machine: Machine;
  onChange(machine: Machine): void;
}

/** Everything a machine document says, with each problem at its field. */
export function MachineEditor({ machine, onChange }: MachineEditorProps) {
  const history = useHistory(machine, onChange);
  const { problems } = useMemo(() => findProblems(Machine, machine), [machine]);
  const editing: MachineEditing = { machine, problems, edit: history.edit, rest: history.rest };
  const { channels } = machine;
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the fields within it have the focus; this only hears undo
    <div onKeyDown={(event: KeyboardEvent) => undoKeys(event, history)}>
      <div className="flex flex-wrap items-center gap-3 pb-5">
        <Button disabled={!history.canUndo} onClick={history.undo} aria-keyshortcuts="Control+Z">
          Undo
        </Button>
        <Button disabled={!history.canRedo} onClick={history.redo} aria-keyshortcuts="Control+Shift+Z">
          Redo
        </Button>
        <p role="status" className="text-small text-soft">
          {problems.all.length === 0
            ? "Nothing to correct."
            : `To correct: ${problems.all.map(({ path }) => placeText(placeOf(path, machine))).join("; ")}`}
        </p>
      </div>
      <Section title="Machine">
        <TextField
          label="Name"
          className="max-w-sm"
          value={machine.name}
          error={problemText("Name", problems.at("name"))}
          onChange={({ target }) => history.edit({ ...machine, name: target.value }, "name")}
          onBlur={history.rest}
        />
      </Section>
      <Section
        title="Channels"
        note="fans and heaters"
        actions={
          <>
            <Button onClick={() => history.edit(channelAdded(machine, "fan"))}>Add a fan</Button>
            <Button onClick={() => history.edit(channelAdded(machine, "heater"))}>Add a heater</Button>
          </>
        }
      >
        {problems.at("channels") && (
          <p className="border-l-2 border-ink pl-2 text-small font-semibold">
            {problemText("The list", problems.at("channels"))}
          </p>
        )}
        {channels.map((_, c) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: a channel is its place in the list while its id is typed
          <ChannelForm key={c} editing={editing} c={c} />
        ))}
        {channels.length === 0 && <p className="text-soft">No channel yet. Without one, no profile can be applied.</p>}
      </Section>
      <Section title="Motion" note="what layer times are computed from">
        <MotionForm editing={editing} />
      </Section>
      <Section title="Surroundings" note="what predictions are computed from">
        <ThermalForm editing={editing} />
      </Section>
      <Section title="Pauses" note="the heater goes to its idle duty before each">
        <PauseForm editing={editing} />
      </Section>
      {channels.some(({ kind }) => kind === "heater") && (
        <Section title="Cautions" note="ticked by each person before the first download for this machine">
          <ul className="flex list-outside list-['–_'] flex-col gap-1 pl-4 text-small">
            {SAFETY_CHECKLIST.map(({ id, text }) => (
              <li key={id}>{text}</li>
            ))}
          </ul>
        </Section>
      )}
    </div>
  );
}
