import type { Assumed } from "#shared/formats/prediction.ts";
import { assumedValues } from "#shared/thermal/surroundings.ts";
import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import {
  boxesOf,
  quantityAt,
  quantityOf,
  type ThermalField,
  thermalGroups,
  withQuantity,
  withThermal,
} from "#src/features/machines/thermal-fields.ts";
import { TextField } from "#src/ui/field.tsx";
import { NumberCell, problemText } from "#src/ui/number-field.tsx";

/** What surrounds the part. Everything may be left out: a stated range then stands in for it. */
export function ThermalForm({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit, rest } = editing;
  const { thermal } = machine;
  const assumed = new Map(assumedValues(machine).map((value) => [value.path, value]));
  return (
    <div className="flex flex-col gap-5">
      <p className="max-w-3xl text-small text-soft">
        Give one number where it is known, a low and a high one beside it where it is known roughly, and nothing where
        it is not: the range in grey is assumed then, and predictions say so.
      </p>
      <TextField
        label="Calibration"
        className="max-w-sm"
        hint="Which fit to readings the numbers come from; empty: none."
        value={thermal?.calibration ?? ""}
        error={problemText("Calibration", problems.at("thermal.calibration"))}
        onChange={({ target }) => {
          const { calibration: _, ...others } = thermal ?? {};
          const named = target.value === "" ? others : { ...others, calibration: target.value };
          edit(withThermal(machine, Object.keys(named).length === 0 ? undefined : named), "thermal.calibration");
        }}
        onBlur={rest}
      />
      {problems.at("thermal") && (
        <p className="border-l-2 border-ink pl-2 text-small font-semibold">
          {problemText("This part", problems.at("thermal"))}
        </p>
      )}
      {thermalGroups(machine).map(({ title, fields }) => (
        <fieldset key={title}>
          <legend className="w-full border-b border-rule pb-1 text-small font-semibold">{title}</legend>
          {fields.map((field) => (
            <ThermalRow
              key={field.path.join(".")}
              field={field}
              group={title}
              editing={editing}
              assumed={assumed.get(`thermal.${field.path.join(".")}`)}
            />
          ))}
        </fieldset>
      ))}
    </div>
  );
}

interface RowProps {
  field: ThermalField;
  group: string;
  editing: MachineEditing;
  assumed: Assumed | undefined;
}

const ENDS = ["low", "typical", "high"] as const;

function ThermalRow({ field, group, editing, assumed }: RowProps) {
  const { machine, problems, edit, rest } = editing;
  const { path, label, unit, step, hint } = field;
  const place = `thermal.${path.join(".")}`;
  const boxes = boxesOf(quantityAt(machine.thermal, path));
  const wrong = problems.within(place)[0];
  return (
    <div className="grid grid-cols-[minmax(0,16rem)_auto_5rem_minmax(0,1fr)] items-center gap-x-3 gap-y-1 border-b border-hair py-1.5 max-lg:grid-cols-[minmax(0,1fr)_auto_4.5rem]">
      <span>
        {label}
        {hint && <span className="block text-fine text-soft">{hint}</span>}
      </span>
      <span className="flex gap-2">
        {ENDS.map((end) => (
          <NumberCell
            key={end}
            label={`${group}, ${label}, ${end}${unit && `, ${unit}`}`}
            placeholder={assumed ? String(assumed[end]) : end}
            className="w-20 placeholder:italic"
            step={step}
            value={boxes[end]}
            problem={wrong && (wrong.path === place || wrong.path === `${place}.${end}`) ? wrong.message : undefined}
            onChange={(value) =>
              edit(withQuantity(machine, path, quantityOf({ ...boxes, [end]: value })), `${place}.${end}`)
            }
            onBlur={rest}
          />
        ))}
      </span>
      <span className="font-mono text-small text-soft">{unit}</span>
      <span className="text-fine text-soft max-lg:col-span-3">
        {assumed && (
          <>
            <span aria-hidden className="font-mono font-bold">
              ?{" "}
            </span>
            assumed: {assumed.source}
          </>
        )}
      </span>
      {wrong && (
        <p className="col-span-full border-l-2 border-ink pl-2 text-small font-semibold">
          {problemText(label, wrong.message)}
        </p>
      )}
    </div>
  );
}
