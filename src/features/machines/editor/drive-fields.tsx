import type { Drive } from "#shared/formats/machine.ts";
import { driveBy } from "#src/features/machines/editor/machine-edits.ts";
import type { DocumentProblems } from "#src/lib/document-problems.ts";
import { SelectField, TextField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

interface Props {
  drive: Drive;
  /** e.g. `channels[0].drive` */
  path: string;
  problems: DocumentProblems;
  onChange(drive: Drive, gesture?: string): void;
}

const FORMS: Record<Drive["by"], string> = {
  "fan-index": "M106, by fan index",
  pin: "M42, by pin",
  "named-fan": "SET_FAN_SPEED, by name",
  "named-pin": "SET_PIN, by name",
};

/** The command that sets an output, and the number that stands for full power in it. */
export function DriveFields({ drive, path, problems, onChange }: Props) {
  return (
    <>
      <SelectField
        label="Command"
        value={drive.by}
        error={problemText("This output", problems.at(path))}
        onChange={({ target }) => onChange(driveBy(drive, target.value as Drive["by"]))}
      >
        {Object.entries(FORMS).map(([by, text]) => (
          <option key={by} value={by}>
            {text}
          </option>
        ))}
      </SelectField>
      {drive.by === "fan-index" && (
        <NumberField
          label="Index"
          hint={drive.index === 0 ? "also M106 without P" : undefined}
          value={drive.index}
          problem={problems.at(`${path}.index`)}
          onChange={(index) => onChange({ ...drive, index: index as number }, `${path}.index`)}
        />
      )}
      {drive.by === "pin" && (
        <NumberField
          label="Pin"
          value={drive.pin}
          problem={problems.at(`${path}.pin`)}
          onChange={(pin) => onChange({ ...drive, pin: pin as number }, `${path}.pin`)}
        />
      )}
      {(drive.by === "named-fan" || drive.by === "named-pin") && (
        <TextField
          label="Name in the firmware"
          className="[&_input]:font-mono"
          value={drive.name}
          error={problemText("Name", problems.at(`${path}.name`))}
          onChange={({ target }) => onChange({ ...drive, name: target.value }, `${path}.name`)}
        />
      )}
      {(drive.by === "fan-index" || drive.by === "pin") && (
        <SelectField
          label="Full power is"
          hint={drive.fullScale === 1 ? "written with a decimal point" : undefined}
          value={drive.fullScale}
          error={problemText("Full power", problems.at(`${path}.fullScale`))}
          onChange={({ target }) => onChange({ ...drive, fullScale: target.value === "1" ? 1 : 255 })}
        >
          <option value={255}>S255</option>
          <option value={1}>S1</option>
        </SelectField>
      )}
      {drive.by === "named-pin" && (
        <NumberField
          label="Full power is VALUE="
          value={drive.fullScale}
          problem={problems.at(`${path}.fullScale`)}
          onChange={(fullScale) => onChange({ ...drive, fullScale: fullScale as number }, `${path}.fullScale`)}
        />
      )}
    </>
  );
}
