import type { Cornering } from "#shared/formats/machine.ts";
import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import { corneringOf, withMotion } from "#src/features/machines/editor/machine-edits.ts";
import { SelectField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

/** How fast corners are taken: one of three rules, each with its own numbers. */
export function CorneringFields({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  const { cornering } = machine.motion;
  const path = "motion.cornering";
  const set = (next: Cornering, field: string) => edit(withMotion(machine, { cornering: next }), `${path}.${field}`);
  return (
    <div className="grid grid-cols-2 gap-3 md:grid-cols-3 xl:grid-cols-4">
      <SelectField
        label="Corners by"
        value={cornering.rule}
        error={problemText("Rule", problems.at(`${path}.rule`))}
        onChange={({ target }) => set(corneringOf(target.value as Cornering["rule"]), "rule")}
      >
        <option value="square-corner-velocity">square corner velocity</option>
        <option value="junction-deviation">junction deviation</option>
        <option value="axis-jerk">jerk of each axis</option>
      </SelectField>
      {cornering.rule === "square-corner-velocity" && (
        <>
          <NumberField
            label="Square corner"
            unit="mm/s"
            step={0.5}
            value={cornering.speedMmS}
            problem={problems.at(`${path}.speedMmS`)}
            onChange={(value) => set({ ...cornering, speedMmS: value as number }, "speedMmS")}
          />
          <NumberField
            label="Least cruised share"
            unit="0–1"
            step={0.05}
            value={cornering.cruiseRatio}
            problem={problems.at(`${path}.cruiseRatio`)}
            onChange={(value) => set({ ...cornering, cruiseRatio: value as number }, "cruiseRatio")}
          />
          <NumberField
            label="Step of E"
            unit="mm/s"
            hint="empty: no limit"
            step={0.5}
            value={cornering.extruderStepMmS}
            problem={problems.at(`${path}.extruderStepMmS`)}
            onChange={(value) => set({ ...cornering, extruderStepMmS: value }, "extruderStepMmS")}
          />
        </>
      )}
      {cornering.rule === "junction-deviation" && (
        <NumberField
          label="Deviation"
          unit="mm"
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
            label={`Jerk ${axis.toUpperCase()}`}
            unit="mm/s"
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
