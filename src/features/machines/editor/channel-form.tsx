import type { Channel } from "#shared/formats/machine.ts";
import { DriveFields } from "#src/features/machines/editor/drive-fields.tsx";
import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import { asKind, withChannel, withoutChannel } from "#src/features/machines/editor/machine-edits.ts";
import { choiceText, named, wordsOf } from "#src/lib/document-words.ts";
import { Button } from "#src/ui/button.tsx";
import { SelectField, TextField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

type NumberOf = "minDuty" | "maxDuty" | "idleDuty" | "startBoostS" | "settleS" | "maxDutyPerS";

interface FieldSpec {
  field: NumberOf;
  step: number;
  hint?: string;
  only?: Channel["kind"];
}

const FIELDS: FieldSpec[] = [
  { field: "minDuty", step: 0.01, hint: "below it a fan stalls" },
  { field: "maxDuty", step: 0.01 },
  { field: "idleDuty", step: 0.01, hint: "at pauses and at the end", only: "heater" },
  { field: "startBoostS", step: 0.1, hint: "full power from standstill", only: "fan" },
  { field: "settleS", step: 0.1, hint: "to 90 % of a change" },
  { field: "maxDutyPerS", step: 0.01, hint: "empty: no limit" },
];

/** One output: its command, and what it can do. */
export function ChannelForm({ editing, c }: { editing: MachineEditing; c: number }) {
  const { machine, problems, edit, rest } = editing;
  const channel = machine.channels[c];
  const path = `channels[${c}]`;
  const set = (changes: Partial<Channel>, gesture?: string) => edit(withChannel(machine, c, changes), gesture);
  const fan = channel.kind === "fan";
  return (
    <fieldset className="border-t border-hair py-4 first:border-t-0 first:pt-0">
      <legend className="sr-only">{`Channel ${channel.id}`}</legend>
      <div className="flex items-center gap-3 pb-3">
        <span aria-hidden="true" className={fan ? "w-5 border-t-2 border-cool" : "w-5 border-t-2 border-heat"} />
        <code className="grow font-mono font-semibold">{channel.id}</code>
        <Button aria-label={`Remove ${channel.id}`} onClick={() => edit(withoutChannel(machine, c))}>
          Remove
        </Button>
      </div>
      {problems.at(path) && (
        <p className="mb-3 border-l-2 border-ink pl-2 text-small font-semibold">
          {problemText("This channel", problems.at(path))}
        </p>
      )}
      <div className="grid grid-cols-2 gap-3 md:grid-cols-3 xl:grid-cols-4">
        <TextField
          label="Id"
          hint="as profiles name it"
          className="[&_input]:font-mono"
          value={channel.id}
          error={problemText("Id", problems.at(`${path}.id`))}
          onChange={({ target }) => set({ id: target.value }, `${path}.id`)}
          onBlur={rest}
        />
        <SelectField
          label="Kind"
          value={channel.kind}
          onChange={({ target }) => set(asKind(channel, target.value as Channel["kind"]))}
        >
          <option value="fan">{choiceText("fan")}</option>
          <option value="heater">{choiceText("heater")}</option>
        </SelectField>
        <DriveFields
          drive={channel.drive}
          path={`${path}.drive`}
          problems={problems}
          onChange={(drive, gesture) => set({ drive }, gesture)}
        />
        {FIELDS.filter(
          ({ only, field }) => only === undefined || only === channel.kind || problems.at(`${path}.${field}`),
        ).map(({ field, step, hint }) => (
          <NumberField
            key={field}
            {...named(`channels.*.${field}`)}
            hint={field === "minDuty" && !fan ? undefined : hint}
            step={step}
            value={channel[field]}
            problem={problems.at(`${path}.${field}`)}
            onChange={(value) => set({ [field]: value }, `${path}.${field}`)}
          />
        ))}
        <ActsFields
          channel={channel}
          problem={problems.at(`${path}.acts`) ?? problems.at(`${path}.acts.immediate`)}
          onChange={(acts, gesture) => set({ acts }, gesture && `${path}.${gesture}`)}
        />
      </div>
    </fieldset>
  );
}

interface ActsProps {
  channel: Channel;
  problem: string | undefined;
  onChange(acts: Channel["acts"], gesture?: string): void;
}

function ActsFields({ channel: { acts }, problem, onChange }: ActsProps) {
  const queued = acts === "queued";
  return (
    <>
      <SelectField
        label={wordsOf("channels.*.acts")}
        value={queued ? "queued" : "immediate"}
        onChange={({ target }) => onChange(target.value === "queued" ? "queued" : { immediate: 0.5 })}
      >
        <option value="queued">{choiceText("queued")}</option>
        <option value="immediate">when the line is read</option>
      </SelectField>
      {!queued && (
        <NumberField
          label="Ahead of the motion by up to"
          unit="s"
          step={0.1}
          value={acts.immediate}
          problem={problem}
          onChange={(value) => onChange({ immediate: value as number }, "acts")}
        />
      )}
    </>
  );
}
