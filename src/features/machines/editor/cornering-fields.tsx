import type { Cornering } from "#shared/formats/machine.ts";
import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import { corneringOf, withMotion } from "#src/features/machines/editor/machine-edits.ts";
import { choiceText, named, wordsOf } from "#src/lib/document-words.ts";
import { SelectField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

const RULES: readonly Cornering["rule"][] = ["square-corner-velocity", "junction-deviation", "axis-jerk"];

/** How fast corners are taken: one of three rules, each with its own numbers. */
export function CorneringFields({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  const { cornering } = machine.motion;
  const path = "motion.cornering";
  const set = (next: Cornering, field: string) => edit(withMotion(machine, { cornering: next }), `${path}.${field}`);
  return (
    <div className="grid grid-cols-2 gap-3 md:grid-cols-3 xl:grid-cols-4">
      <SelectField
        label={wordsOf(`${path}.rule`)}
        value={cornering.rule}
        error={problemText("Rule", problems.at(`${path}.rule`))}
        onChange={({ target }) => set(corneringOf(target.value as Cornering["rule"]), "rule")}
      >
        {RULES.map((rule) => (
          <option key={rule} value={rule}>
            {choiceText(rule)}
          </option>
        ))}
      </SelectField>
      {cornering.rule === "square-corner-velocity" && (
        <>
          <NumberField
            {...named(`${path}.speedMmS`)}
            hint="firmware: square corner velocity"
            step={0.5}
            value={cornering.speedMmS}
            problem={problems.at(`${path}.speedMmS`)}
            onChange={(value) => set({ ...cornering, speedMmS: value as number }, "speedMmS")}
          />
          <NumberField
            {...named(`${path}.cruiseRatio`)}
            hint="firmware: minimum cruise ratio"
            step={0.05}
            value={cornering.cruiseRatio}
            problem={problems.at(`${path}.cruiseRatio`)}
            onChange={(value) => set({ ...cornering, cruiseRatio: value as number }, "cruiseRatio")}
          />
          <NumberField
            {...named(`${path}.extruderStepMmS`)}
            hint="empty: no limit; firmware: instantaneous corner velocity"
            step={0.5}
            value={cornering.extruderStepMmS}
            problem={problems.at(`${path}.extruderStepMmS`)}
            onChange={(value) => set({ ...cornering, extruderStepMmS: value }, "extruderStepMmS")}
          />
        </>
      )}
      {cornering.rule === "junction-deviation" && (
        <NumberField
          {...named(`${path}.deviationMm`)}
          hint="firmware: junction deviation"
          step={0.001}
          value={cornering.deviationMm}
          problem={problems.at(`${path}.deviationMm`)}
          onChange={(value) => set({ ...cornering, deviationMm: value as number }, "deviationMm")}
        />
      )}
      {cornering.rule === "axis-jerk" &&
        (["x", "y", "z", "e"] as const).map((axis) => (
          <NumberField
            key={axis}
            {...named(`${path}.jerkMmS.${axis}`)}
            hint="firmware: jerk"
            step={0.5}
            value={cornering.jerkMmS[axis]}
            problem={problems.at(`${path}.jerkMmS.${axis}`)}
            onChange={(value) =>
              set({ ...cornering, jerkMmS: { ...cornering.jerkMmS, [axis]: value } }, `jerkMmS.${axis}`)
            }
          />
        ))}
    </div>
  );
}
