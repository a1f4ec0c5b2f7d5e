import type { Motion } from "#shared/formats/machine.ts";
import { CorneringFields } from "#src/features/machines/editor/cornering-fields.tsx";
import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import { withAxisLimit, withMotion } from "#src/features/machines/editor/machine-edits.ts";
import { CheckField, SelectField } from "#src/ui/field.tsx";
import { NumberField } from "#src/ui/number-field.tsx";

const GRID = "grid grid-cols-2 gap-3 md:grid-cols-3 xl:grid-cols-4";

/** What layer times are computed from. */
export function MotionForm({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  const { motion } = machine;
  const set = (changes: Partial<Motion>, field: string) => edit(withMotion(machine, changes), `motion.${field}`);
  const number = (
    label: string,
    unit: string,
    field: "maxSpeedMmS" | "initialSpeedMmS" | "arcSegmentMm" | "filamentDiameterMm",
    step: number,
  ) => (
    <NumberField
      label={label}
      unit={unit}
      step={step}
      value={motion[field]}
      problem={problems.at(`motion.${field}`)}
      onChange={(value) => set({ [field]: value }, field)}
    />
  );
  return (
    <div className="flex flex-col gap-5">
      <div className={GRID}>
        {number("Top speed", "mm/s", "maxSpeedMmS", 5)}
        {(["print", "travel", "retract"] as const).map((kind) => (
          <NumberField
            key={kind}
            label={`Acceleration, ${kind}`}
            unit="mm/s²"
            step={50}
            value={motion.accelMmS2[kind]}
            problem={problems.at(`motion.accelMmS2.${kind}`)}
            onChange={(value) => set({ accelMmS2: { ...motion.accelMmS2, [kind]: value } }, `accelMmS2.${kind}`)}
          />
        ))}
      </div>
      <CorneringFields editing={editing} />
      <AxisFields editing={editing} />
      <div className={GRID}>
        <SelectField
          label="Limits of E hold for"
          value={motion.extruderLimits}
          onChange={({ target }) => set({ extruderLimits: target.value as Motion["extruderLimits"] }, "extruderLimits")}
        >
          <option value="extrude-only">moves of E alone</option>
          <option value="every-move">every move</option>
        </SelectField>
        <LookAheadFields editing={editing} />
        <SelectField
          label="P of a dwell is in"
          value={motion.dwellP}
          onChange={({ target }) => set({ dwellP: target.value as Motion["dwellP"] }, "dwellP")}
        >
          <option value="ms">ms</option>
          <option value="s">s</option>
        </SelectField>
        {number("Speed before the first F", "mm/s", "initialSpeedMmS", 1)}
        {number("Chord of arcs", "mm", "arcSegmentMm", 0.1)}
        {number("Filament", "mm", "filamentDiameterMm", 0.05)}
        {(["lengthMm", "speedMmS"] as const).map((field) => (
          <NumberField
            key={field}
            label={field === "lengthMm" ? "Firmware retraction" : "Its speed"}
            unit={field === "lengthMm" ? "mm" : "mm/s"}
            step={field === "lengthMm" ? 0.1 : 1}
            value={motion.firmwareRetract[field]}
            problem={problems.at(`motion.firmwareRetract.${field}`)}
            onChange={(value) =>
              set({ firmwareRetract: { ...motion.firmwareRetract, [field]: value } }, `firmwareRetract.${field}`)
            }
          />
        ))}
      </div>
      <div>
        <CheckField
          label="A move of E alone is a full stop"
          checked={motion.stopAtExtrudeOnly}
          onChange={({ target }) => set({ stopAtExtrudeOnly: target.checked }, "stopAtExtrudeOnly")}
        />
        <CheckField
          label="Limits set in the file hold, never above these"
          checked={motion.honourFileLimits}
          onChange={({ target }) => set({ honourFileLimits: target.checked }, "honourFileLimits")}
        />
        <CheckField
          label="G90 and G91 set the mode of E too"
          checked={motion.axisModeSetsExtruder}
          onChange={({ target }) => set({ axisModeSetsExtruder: target.checked }, "axisModeSetsExtruder")}
        />
      </div>
    </div>
  );
}

/** Limits of single axes; an empty one is no limit. */
function AxisFields({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  return (
    <div className="grid grid-cols-2 gap-3 md:grid-cols-4">
      {(["x", "y", "z", "e"] as const).map((axis) => (
        <fieldset key={axis} className="flex flex-col gap-3 border-l border-hair pl-3">
          <legend className="sr-only">{`Axis ${axis.toUpperCase()}`}</legend>
          {(["maxSpeedMmS", "maxAccelMmS2"] as const).map((field) => (
            <NumberField
              key={field}
              label={`${axis.toUpperCase()} ${field === "maxSpeedMmS" ? "speed" : "acceleration"}`}
              unit={field === "maxSpeedMmS" ? "mm/s" : "mm/s²"}
              hint="empty: no limit"
              step={field === "maxSpeedMmS" ? 1 : 50}
              value={machine.motion.axes[axis]?.[field]}
              problem={problems.at(`motion.axes.${axis}.${field}`)}
              onChange={(value) => edit(withAxisLimit(machine, axis, field, value), `motion.axes.${axis}.${field}`)}
            />
          ))}
        </fieldset>
      ))}
    </div>
  );
}

function LookAheadFields({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  const { lookAhead } = machine.motion;
  const whole = lookAhead === "full";
  return (
    <>
      <SelectField
        label="Look-ahead"
        value={whole ? "full" : "blocks"}
        onChange={({ target }) => edit(withMotion(machine, { lookAhead: target.value === "full" ? "full" : 16 }))}
      >
        <option value="full">the whole file</option>
        <option value="blocks">a number of blocks</option>
      </SelectField>
      {!whole && (
        <NumberField
          label="Blocks"
          step={1}
          value={lookAhead}
          problem={problems.at("motion.lookAhead")}
          onChange={(value) => edit(withMotion(machine, { lookAhead: value as number }), "motion.lookAhead")}
        />
      )}
    </>
  );
}
